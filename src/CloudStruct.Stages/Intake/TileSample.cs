using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Intake;

/// <summary>A random sample of bounded size from a stream: points whose scrambled number lies below a falling limit.</summary>
/// <remarks>Not every n-th point: files are often written row by row, and then every n-th point is a pattern.</remarks>
internal sealed class TileSample(int capacity)
{
    private readonly List<(ulong Draw, Vec3 Place)> taken = [];
    private ulong limit = ulong.MaxValue;

    /// <summary>Share of the stream that the sample holds.</summary>
    public double Share => limit / (double)ulong.MaxValue;

    /// <summary>The places, in the order of the stream.</summary>
    public Vec3[] Places => [.. taken.Select(t => t.Place)];

    /// <summary>Offers a point by its number in the stream.</summary>
    public void Offer(long index, Vec3 place)
    {
        ulong draw = Fingerprint.Mix(unchecked((ulong)index + 0x632BE59BD9B4E019UL));
        if (draw > limit) return;
        taken.Add((draw, place));
        if (taken.Count <= capacity) return;
        limit /= 2;
        taken.RemoveAll(t => t.Draw > limit);
    }
}
