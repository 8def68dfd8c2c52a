using CloudStruct.Maths.Blocks;

namespace CloudStruct.Stages.Faces;

/// <summary>Tells faces from weathered rock and soil that happen to be flat on the whole.</summary>
/// <remarks>What gives them away is how much the local normals spread about the plane, compared with the large faces of the
/// same scene; residual scatter and curvature do not.</remarks>
internal static class Refusing
{
    private const double MiddleM2 = 0.25, SmallM2 = 0.1;
    private const double SmallLimit = 1.25, MiddleLimit = 1.35, LargeLimit = 1.45;

    /// <summary>Whether each label is refused; needs sorted pieces.</summary>
    public static bool[] Of(Surface surface, Pieces pieces)
    {
        var spread = new double[pieces.Count];
        BlockParallel.For(
            pieces.Count,
            surface.Threads,
            surface.Stop,
            (from, to) =>
            {
                for (int k = Math.Max(1, from); k < to; k++) spread[k] = Spread(surface, pieces, k);
            },
            length: 16);
        double usual = Usual(surface, pieces, spread);
        var refused = new bool[pieces.Count];
        for (int k = 1; k < pieces.Count; k++)
        {
            double area = pieces.Of(k).Length * surface.PointAreaM2;
            double limit = area < SmallM2 ? SmallLimit : area < MiddleM2 ? MiddleLimit : LargeLimit;
            refused[k] = spread[k] > limit * usual;
        }

        return refused;
    }

    // Rms sine of the angle between local normals and the plane.
    private static double Spread(Surface surface, Pieces pieces, int label)
    {
        double sum = 0;
        ReadOnlySpan<int> points = pieces.Of(label);
        foreach (int i in points)
        {
            double c = surface.Agreement(i, pieces.Planes[label].Normal);
            sum += 1 - (c * c);
        }

        return Math.Sqrt(Math.Max(0, sum / Math.Max(1, points.Length)));
    }

    // Area-weighted median over the faces of middle size and more; over all when there are none.
    private static double Usual(Surface surface, Pieces pieces, double[] spread)
    {
        int[] all = [.. Enumerable.Range(1, pieces.Count - 1)];
        int[] large = [.. all.Where(k => pieces.Of(k).Length * surface.PointAreaM2 > MiddleM2)];
        int[] chosen = large.Length > 0 ? large : all;
        Array.Sort(chosen, (a, b) => spread[a] != spread[b] ? spread[a].CompareTo(spread[b]) : a.CompareTo(b));
        long total = chosen.Sum(k => (long)pieces.Of(k).Length), sum = 0;
        foreach (int k in chosen)
        {
            sum += pieces.Of(k).Length;
            if (2 * sum >= total) return spread[k];
        }

        return double.PositiveInfinity;
    }
}
