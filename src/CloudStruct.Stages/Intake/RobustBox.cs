using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Intake;

/// <summary>The box around the body of a cloud, wide enough for any real rock near it and blind to garbage far away.</summary>
/// <remarks>The middle nine tenths along each axis, widened by three of their diagonals on every side. A second body out
/// there (a dense patch, not scattered points or one place many times) is taken in.</remarks>
internal static class RobustBox
{
    private const double Tail = 0.05;
    private const double Diagonals = 3;

    // Sampled points nearer to each other than this many typical distances form a body; it must hold one in 300 of all.
    private const double NearRatio = 8;
    private const double LeastShare = 1.0 / 300;

    /// <summary>Lowest and highest corner in the coordinates of the sample.</summary>
    /// <param name="sample">Places of one file, at least one.</param>
    public static (Vec3 Min, Vec3 Max) Of(Vec3[] sample)
    {
        (Vec3 min, Vec3 max) = Middle(sample);
        Vec3[] outside = [.. sample.Where(p => !Inside(p, min, max)).Distinct()];
        if (outside.Length == 0) return (min, max);
        if (outside.Length < LeastShare * sample.Length) return (min, max);

        double typical = TypicalDistance(sample.Where(p => Inside(p, min, max)).Take(2000).ToArray());
        foreach (Vec3 p in outside)
        {
            int near = outside.Count(q => q != p && (q - p).Length < NearRatio * typical);
            if (near < 3) continue;
            min = new Vec3(Math.Min(min.X, p.X - typical), Math.Min(min.Y, p.Y - typical), Math.Min(min.Z, p.Z - typical));
            max = new Vec3(Math.Max(max.X, p.X + typical), Math.Max(max.Y, p.Y + typical), Math.Max(max.Z, p.Z + typical));
        }

        return (min, max);
    }

    /// <summary>Whether a place lies in a box, its rim included.</summary>
    public static bool Inside(Vec3 p, Vec3 min, Vec3 max) =>
        p.X >= min.X && p.Y >= min.Y && p.Z >= min.Z && p.X <= max.X && p.Y <= max.Y && p.Z <= max.Z;

    private static (Vec3 Min, Vec3 Max) Middle(Vec3[] sample)
    {
        (double x0, double x1) = Range(sample, p => p.X);
        (double y0, double y1) = Range(sample, p => p.Y);
        (double z0, double z1) = Range(sample, p => p.Z);
        double wide = Math.Max(1e-3, Diagonals * new Vec3(x1 - x0, y1 - y0, z1 - z0).Length);
        if (sample.Length < 40) wide = double.MaxValue / 4;   // too few to tell what is far
        return (new Vec3(x0 - wide, y0 - wide, z0 - wide), new Vec3(x1 + wide, y1 + wide, z1 + wide));
    }

    private static (double Low, double High) Range(Vec3[] sample, Func<Vec3, double> of)
    {
        double[] values = Array.ConvertAll(sample, p => of(p));
        int last = values.Length - 1;
        return (OrderStatistic.Nth<double>(values, (int)(Tail * last)), OrderStatistic.Nth<double>(values, (int)Math.Ceiling((1 - Tail) * last)));
    }

    // Median distance to the nearest other of a few thousand points: brute force.
    private static double TypicalDistance(Vec3[] places)
    {
        double[] nearest = new double[places.Length];
        for (int i = 0; i < places.Length; i++)
        {
            nearest[i] = double.MaxValue;
            for (int j = 0; j < places.Length; j++)
            {
                if (j != i && places[j] != places[i]) nearest[i] = Math.Min(nearest[i], (places[j] - places[i]).Length);
            }
        }

        Array.Sort(nearest);
        return nearest.Length < 2 ? 1 : nearest[nearest.Length / 2];
    }
}
