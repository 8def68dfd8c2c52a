using CloudStruct.Records.Classes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Width;

namespace CloudStruct.Stages.Drawings;

/// <summary>Cover, inclusions and density along each dike, for the strip along chainage.</summary>
internal static class ChainageCells
{
    private const int MostCells = 120;
    private const double ShortestM = 0.25;

    // To either side of the centre line: the dike and a hand of host, where contacts are looked for.
    private const double ReachInWidths = 1, LeastReachM = 1;
    private const int FewestPoints = 20;

    /// <summary>Cells of all dikes, dike after dike in order of chainage; stretches without points are left out.</summary>
    public static ChainageCell[] Of(Findings input) => [.. input.Contacts.Dikes.SelectMany(d => Along(input, d))];

    private static IEnumerable<ChainageCell> Along(Findings input, DikeFrame dike)
    {
        WorkingCloud cloud = input.Described.Cloud;
        if (dike.CentreLine.Length < 2 || input.Classes.Class.Length != cloud.Count) yield break;
        double first = dike.ChainageM[0], length = dike.ChainageM[^1] - first, cell = Math.Max(ShortestM, length / MostCells);
        int count = (int)Math.Ceiling(length / cell);
        double reach = Math.Max(LeastReachM, ReachInWidths * (input.Width.Dikes.FirstOrDefault(d => d.Dike == dike.Dike)?.WidthMeanM?.Value ?? 2));
        double[] all = new double[count], cover = new double[count], rock = new double[count], inclusion = new double[count];
        long[] points = new long[count];
        int[] working = new int[count];
        Vec3 axis = dike.CentreLine[^1] - dike.CentreLine[0];
        axis = new Vec3(axis.X, axis.Y, 0).Unit();
        double[] along = [.. dike.CentreLine.Select(p => (p - dike.CentreLine[0]).Dot(axis))];
        for (int i = 0; i < cloud.Count; i++)
        {
            Vec3 p = cloud.Place(i) - dike.CentreLine[0];
            int c = CellOf(p, p.Dot(axis), dike, along, reach, first, cell);
            if (c < 0 || c >= count) continue;
            double area = i < input.Described.AreaM2.Length ? input.Described.AreaM2[i] : 1;
            var rockClass = (RockClass)input.Classes.Class[i];
            all[c] += area;
            working[c]++;
            points[c] += i < cloud.Support.Length ? cloud.Support[i] : 1;
            if (rockClass == RockClass.Cover) cover[c] += area;
            if (rockClass is RockClass.Dike or RockClass.Inclusion) rock[c] += area;
            if (rockClass == RockClass.Inclusion) inclusion[c] += area;
        }

        for (int c = 0; c < count; c++)
        {
            if (working[c] < FewestPoints || !(all[c] > 0)) continue;
            yield return new ChainageCell(
                dike.Dike, first + (c * cell), Math.Min(first + ((c + 1) * cell), first + length), cover[c] / all[c], rock[c] > 0 ? inclusion[c] / rock[c] : null, points[c] / all[c]);
        }
    }

    /// <summary>Cell of a place: by the piece of the centre line that lies beside it in map view.</summary>
    private static int CellOf(Vec3 fromStart, double s, DikeFrame dike, double[] along, double reach, double first, double cell)
    {
        if (s < along[0] || s > along[^1]) return -1;
        int k = Array.BinarySearch(along, s);
        k = Math.Clamp(k < 0 ? ~k : k, 1, along.Length - 1);
        Vec3 a = dike.CentreLine[k - 1] - dike.CentreLine[0], b = dike.CentreLine[k] - dike.CentreLine[0];
        double t = along[k] > along[k - 1] ? (s - along[k - 1]) / (along[k] - along[k - 1]) : 0;
        Vec3 on = a + ((b - a) * t);
        double off = Math.Sqrt(Math.Pow(fromStart.X - on.X, 2) + Math.Pow(fromStart.Y - on.Y, 2));
        if (off > reach) return -1;
        return (int)Math.Floor((dike.ChainageM[k - 1] + (t * (dike.ChainageM[k] - dike.ChainageM[k - 1])) - first) / cell);
    }
}
