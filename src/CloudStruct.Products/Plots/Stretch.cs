using CloudStruct.Records.Drawings;
using CloudStruct.Records.Width;

namespace CloudStruct.Products.Plots;

/// <summary>Neighbouring stations of one status. A stretch reaches half-way to the stations of the next one.</summary>
/// <param name="Status">Status.</param>
/// <param name="Points">Stations.</param>
/// <param name="FromM">Start [m].</param>
/// <param name="ToM">End [m].</param>
/// <param name="OfTotal">Stations of the whole dike.</param>
internal sealed record Stretch(StationStatus Status, WidthPoint[] Points, double FromM, double ToM, int OfTotal)
{
    /// <summary>Cuts stations in order of chainage into stretches; empty without stations.</summary>
    public static List<Stretch> Of(WidthPoint[] points)
    {
        var stretches = new List<Stretch>();
        for (int from = 0; from < points.Length;)
        {
            int to = from + 1;
            while (to < points.Length && points[to].Status == points[from].Status) to++;
            double start = Between(points, from - 1, from), end = Between(points, to - 1, to);
            stretches.Add(new(points[from].Status, points[from..to], start, end, points.Length));
            from = to;
        }
        return stretches;
    }

    // Half-way between two stations. Beyond the first and the last: half the distance of the nearest two, on the other side.
    private static double Between(WidthPoint[] p, int a, int b)
    {
        if (p.Length == 1) return a < 0 ? p[0].ChainageM - 0.5 : p[0].ChainageM + 0.5;
        if (a < 0) return p[0].ChainageM - ((p[1].ChainageM - p[0].ChainageM) / 2);
        if (b >= p.Length) return p[^1].ChainageM + ((p[^1].ChainageM - p[^2].ChainageM) / 2);
        return (p[a].ChainageM + p[b].ChainageM) / 2;
    }
}
