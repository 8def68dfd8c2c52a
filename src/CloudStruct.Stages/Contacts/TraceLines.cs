using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Contacts;

/// <summary>Strings trace cells to polylines.</summary>
internal static class TraceLines
{
    private const int LeastCells = 3;   // two cells side by side are as likely an island of wrong labels as a margin
    private const double BridgedM = 1;  // what a person would bridge by eye: a tuft, a corner out of sight

    /// <summary>Polylines of one margin in order of chainage, broken where cells are missing.</summary>
    /// <param name="dike">Number of the dike.</param>
    /// <param name="margin">Side.</param>
    /// <param name="cells">Cells of both margins in order of s.</param>
    /// <param name="cellM">Edge of a cell [m].</param>
    /// <param name="sigmaM">Position error of a cell across the margin [m].</param>
    /// <param name="chainageAt">Chainage of a place along the sheet.</param>
    public static IEnumerable<MarginTrace> Of(
        int dike, Margin margin, IEnumerable<TraceCell> cells, double cellM, double sigmaM, Func<double, double> chainageAt)
    {
        var run = new List<TraceCell>();
        foreach (TraceCell c in cells.Where(c => c.Margin == margin))
        {
            if (run.Count > 0 && c.At.S - run[^1].At.S > Math.Max(BridgedM, 2.4 * cellM))
            {
                if (run.Count >= LeastCells) yield return Line(dike, margin, run, cellM, sigmaM, chainageAt);
                run.Clear();
            }

            run.Add(c);
        }

        if (run.Count >= LeastCells) yield return Line(dike, margin, run, cellM, sigmaM, chainageAt);
    }

    // Where the trace climbs a wall many cells share one place along strike: each such group is walked from the end that is
    // nearer to where the line stands.
    private static MarginTrace Line(int dike, Margin margin, List<TraceCell> run, double cellM, double sigmaM, Func<double, double> chainageAt)
    {
        var ordered = new List<TraceCell>(run.Count);
        for (int from = 0; from < run.Count;)
        {
            int to = from;
            while (to < run.Count && run[to].At.S - run[from].At.S < cellM) to++;
            List<TraceCell> group = [.. run.GetRange(from, to - from).OrderBy(c => c.At.T)];
            if (ordered.Count > 0 && (group[^1].Place - ordered[^1].Place).Length < (group[0].Place - ordered[^1].Place).Length) group.Reverse();
            ordered.AddRange(group);
            from = to;
        }

        var sigma = new double[ordered.Count];
        Array.Fill(sigma, sigmaM);
        return new MarginTrace(dike, margin, [.. ordered.Select(c => c.Place)], [.. ordered.Select(c => chainageAt(c.At.S))], sigma);
    }
}
