using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Intake;

/// <summary>A 64-bit number for a place, equal for coordinates that agree to a thousandth of a millimetre.</summary>
/// <remarks>The same cloud saved as LAS and as PLY differs in the last digits of its doubles; rounding makes it the same
/// again. Coarser steps would take the neighbours in a model of a hand specimen (0.4 mm apart) for one point. Among 100 million places two different ones share a number with a chance of 1 in 3700.</remarks>
internal static class Fingerprint
{
    private const double StepsPerM = 1e6;

    /// <summary>Number of a place in map coordinates [m].</summary>
    public static ulong Of(Vec3 place)
    {
        unchecked
        {
            ulong h = Mix((ulong)(long)Math.Round(place.X * StepsPerM) + 0x9E3779B97F4A7C15UL);
            h = Mix(h ^ ((ulong)(long)Math.Round(place.Y * StepsPerM) * 0xC2B2AE3D27D4EB4FUL));
            return Mix(h ^ ((ulong)(long)Math.Round(place.Z * StepsPerM) * 0x165667B19E3779F9UL));
        }
    }

    /// <summary>Scrambles the bits of a number.</summary>
    public static ulong Mix(ulong z)
    {
        unchecked
        {
            z = (z ^ (z >> 32)) * 0xD6E8FEB86659FD93UL;
            z = (z ^ (z >> 32)) * 0xD6E8FEB86659FD93UL;
            return z ^ (z >> 32);
        }
    }
}
