using CloudStruct.Maths.Planar;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Width;

namespace CloudStruct.Stages.Drawings;

/// <summary>Contacts and the ground of dikes on the map.</summary>
internal static class MapLines
{
    /// <summary>Every traced stretch, and between the stretches of one margin a straight join as concealed.</summary>
    public static MapLine[] Contacts(Findings input)
    {
        var lines = new List<MapLine>();
        foreach (IGrouping<(int Dike, Margin Margin), MarginTrace> side in input.Contacts.Traces
            .Where(t => t.Points.Length > 1).GroupBy(t => (t.Dike, t.Margin)).OrderBy(g => g.Key.Dike).ThenBy(g => g.Key.Margin))
        {
            string margin = side.Key.Margin.ToString();
            MarginTrace? before = null;
            foreach (MarginTrace trace in side.OrderBy(t => t.ChainageM[0]))
            {
                if (before is not null && trace.ChainageM[0] > before.ChainageM[^1])
                    lines.Add(new MapLine("concealed", side.Key.Dike, margin, [Flat(before.Points[^1]), Flat(trace.Points[0])]));
                lines.Add(new MapLine("contact", side.Key.Dike, margin, [.. trace.Points.Select(Flat)]));
                before = trace;
            }
        }

        return [.. lines];
    }

    /// <summary>The ground between the margins over runs of stations at which both show: valid closed rings.</summary>
    public static MapLine[] Areas(Findings input)
    {
        var areas = new List<MapLine>();
        foreach (IGrouping<int, Station> dike in input.Width.Stations.GroupBy(s => s.Dike))
        {
            Station[] own = [.. dike];
            for (int from = 0; from < own.Length; from++)
            {
                int to = from;
                while (to < own.Length && own[to] is { AtA: not null, AtB: not null }) to++;
                if (to - from > 1)
                {
                    Point2[] ring = [.. Side(input, own[from], own[to - 1], Margin.A), .. Side(input, own[from], own[to - 1], Margin.B).Reverse()];
                    Point2[] mended = PlanarShape.Of(ring).Ring;
                    if (mended.Length > 2) areas.Add(new MapLine("dike", dike.Key, "", [.. mended, mended[0]]));
                }

                from = to;
            }
        }

        return [.. areas];
    }

    // From the first station's point on the margin along the trace to the last station's.
    private static IEnumerable<Point2> Side(Findings input, Station first, Station last, Margin margin)
    {
        yield return Flat((margin == Margin.A ? first.AtA : first.AtB)!.Value);
        IEnumerable<(double Chainage, Vec3 At)> between = input.Contacts.Traces
            .Where(t => t.Dike == first.Dike && t.Margin == margin)
            .SelectMany(t => t.Points.Select((p, i) => (t.ChainageM[i], p)))
            .Where(p => p.Item1 > first.ChainageM && p.Item1 < last.ChainageM)
            .OrderBy(p => p.Item1);
        foreach ((double _, Vec3 at) in between) yield return Flat(at);
        yield return Flat((margin == Margin.A ? last.AtA : last.AtB)!.Value);
    }

    private static Point2 Flat(Vec3 p) => new(p.X, p.Y);
}
