namespace CloudStruct.Stages.Intake;

/// <summary>The shift of each file that makes the measured offsets vanish as well as they can.</summary>
internal static class TileShifts
{
    private const int MostRounds = 10_000;
    private const double StillM = 1e-7;

    /// <summary>Least squares over all offsets, weighted by their errors; the mean shift of each connected group is nothing.</summary>
    /// <remarks>Gauss and Seidel: each file in turn takes the weighted mean of what its neighbours ask of it.</remarks>
    /// <returns>Added to z [m], one per file; nothing for files without an offset.</returns>
    public static double[] Of(List<TileOffset> offsets, int tiles)
    {
        var shift = new double[tiles];
        for (int round = 0; round < MostRounds; round++)
        {
            double moved = 0;
            for (int t = 0; t < tiles; t++)
            {
                double sum = 0, weight = 0;
                foreach (TileOffset o in offsets)
                {
                    if (o.A != t && o.B != t) continue;
                    double w = 1 / (o.SigmaM * o.SigmaM);
                    sum += w * (o.A == t ? shift[o.B] + o.OffsetM : shift[o.A] - o.OffsetM);
                    weight += w;
                }

                if (weight == 0) continue;
                moved = Math.Max(moved, Math.Abs((sum / weight) - shift[t]));
                shift[t] = sum / weight;
            }

            if (moved < StillM) break;
        }

        foreach (IGrouping<int, int> group in Groups(offsets, tiles))
        {
            double mean = group.Average(t => shift[t]);
            foreach (int t in group) shift[t] -= mean;
        }

        return shift;
    }

    private static IEnumerable<IGrouping<int, int>> Groups(List<TileOffset> offsets, int tiles)
    {
        int[] group = [.. Enumerable.Range(0, tiles)];
        foreach (TileOffset o in offsets)
        {
            int from = Math.Max(group[o.A], group[o.B]), to = Math.Min(group[o.A], group[o.B]);
            for (int t = 0; t < tiles; t++)
            {
                if (group[t] == from) group[t] = to;
            }
        }

        return Enumerable.Range(0, tiles).GroupBy(t => group[t]);
    }
}
