using CloudStruct.Maths.Blocks;

namespace CloudStruct.Stages.Faces;

/// <summary>Tells faces from weathered rock and soil that happen to be flat on the whole.</summary>
/// <remarks>Three signs are weighed, all relative to the scene so that neither its noise nor its rock matters: how much the local
/// normals spread about the plane, how far the points scatter, and the power of the residual waves. The weights are those
/// of a logistic regression on simulated outcrops, rounded; docs/methods-faces.md gives what each sign reaches alone.</remarks>
internal static class Refusing
{
    private const double MiddleM2 = 0.25;

    // A small flat piece is soon found by chance on bumpy ground, a large one hardly ever; and the waves of a small piece are few
    // and chancy, while those of a large one tell most. Beyond the limits more or less area says no more.
    private const double LeastM2 = 0.05, MostM2 = 1;
    private const double SpreadWeight = 3, ScatterWeight = 3.4, WaveWeight = 1, WaveWeightBySize = 1, Limit = 2.25, LimitBySize = 1.25;

    // For places within a face, by spread and scatter alone.
    private const double WornSpreadWeight = 4, WornScatterWeight = 2.5;

    /// <summary>Whether a piece is weathered rock or soil.</summary>
    /// <param name="spread">Spread of its local normals over the usual.</param>
    /// <param name="rough">Its roughness against the scene.</param>
    /// <param name="areaM2">Its area [m²].</param>
    public static bool IsWeathered(double spread, Roughness rough, double areaM2)
    {
        double size = Math.Log(Math.Clamp(areaM2, LeastM2, MostM2) / MiddleM2);
        double signs = (SpreadWeight * Log(spread)) + (ScatterWeight * Log(rough.Scatter)) + ((WaveWeight + (WaveWeightBySize * size)) * Log(rough.WavePower));
        return signs > Limit + (LimitBySize * size);
    }

    /// <summary>The same for a place, by the local means of squared spread and squared scatter over the usual.</summary>
    public static bool IsWorn(double spreadSquared, double scatterSquared, double limit) =>
        (WornSpreadWeight / 2 * Log(spreadSquared)) + (WornScatterWeight / 2 * Log(scatterSquared)) > limit;

    /// <summary>Rms sine between local normals and plane per label, over the area-weighted median of the scene's faces of middle
    /// size and more (of all when there are none). Needs sorted pieces.</summary>
    public static double[] Spreads(Surface surface, Pieces pieces) => Spreads(surface, pieces, out _);

    /// <summary>The same, with that median.</summary>
    public static double[] Spreads(Surface surface, Pieces pieces, out double usual)
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
        usual = Usual(surface, pieces, spread);
        for (int k = 1; k < spread.Length; k++) spread[k] = usual > 0 ? spread[k] / usual : 1;
        return spread;
    }

    private static double Log(double ratio) => Math.Log(Math.Clamp(ratio, 0.05, 20));

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

        return 0;
    }
}
