using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Intake;

/// <summary>Upright columns of square cross-section over the survey, numbered.</summary>
internal static class Columns
{
    private const long Half = 1L << 30;

    /// <summary>Number of the column that holds a local place.</summary>
    public static long Key(Vec3 p, double edgeM) => (((long)Math.Floor(p.Y / edgeM) + Half) << 31) | ((long)Math.Floor(p.X / edgeM) + Half);

    /// <summary>Middle of a column (z = 0), local [m].</summary>
    public static Vec3 Middle(long key, double edgeM) => new(
        ((key & ((1L << 31) - 1)) - Half + 0.5) * edgeM, ((key >> 31) - Half + 0.5) * edgeM, 0);
}
