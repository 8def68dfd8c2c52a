using CloudStruct.Records.Classes;
using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Rock;

namespace CloudStruct.Simulate;

/// <summary>Finds where along strike the margins of a dike can be seen in the cloud that was made.</summary>
internal static class DikeTruth
{
    private const double BinM = 0.25, BesideM = 0.25;

    /// <summary>A margin is seen where both rocks show beside it within this many bins to either side: gaps that a
    /// person would bridge, up to about a metre, do not count as hidden.</summary>
    private const int ReachBins = 2;

    /// <summary>Share of the strip beside the margin that must show each rock.</summary>
    private const double EnoughShare = 0.08;

    /// <summary>The truth about one dike.</summary>
    /// <param name="sheet">Its body.</param>
    /// <param name="places">Points before noise, local.</param>
    /// <param name="classes">True class of each.</param>
    /// <param name="dikeOf">The dike each belongs to: where a later dike cuts this one, its margins are gone.</param>
    /// <param name="origin">Map coordinates of the local origin.</param>
    /// <param name="spacingM">Mean distance of neighbouring points [m].</param>
    public static SimulatedDike Make(DikeSheet sheet, Func<int, Vec3> places, byte[] classes, byte[] dikeOf, Vec3 origin, double spacingM)
    {
        double stripM2 = BesideM * BinM * ((2 * ReachBins) + 1);
        int enough = (int)Math.Max(3, EnoughShare * stripM2 / (spacingM * spacingM));
        int half = (int)(sheet.HalfReachM / BinM), bins = 2 * half;
        var near = new int[bins, 2, 2];   // bin, margin, side of it
        var line = new (Vec3 Sum, int Count)[bins];
        for (int i = 0; i < classes.Length; i++)
        {
            if (classes[i] == (byte)RockClass.Unknown) continue;
            (double s, double v, double w) = sheet.Inside(places(i));
            int bin = (int)Math.Floor(s / BinM) + half;
            if (bin < 0 || bin >= bins || Math.Abs(w) > 30) continue;
            double fromA = w - sheet.Rest(0, s, v), fromB = w - sheet.Rest(1, s, v);
            if (fromA > 0 && fromB < 0 && Math.Abs(fromA + fromB) < 0.5) line[bin] = (line[bin].Sum + places(i), line[bin].Count + 1);
            bool inside = fromA > 0 && fromB < 0;
            bool rock = inside ? dikeOf[i] == sheet.Number : classes[i] == (byte)RockClass.Host || dikeOf[i] == sheet.Number;
            if (!rock) continue;
            if (Math.Abs(fromA) < BesideM) near[bin, 0, fromA > 0 ? 1 : 0]++;
            if (Math.Abs(fromB) < BesideM) near[bin, 1, fromB > 0 ? 1 : 0]++;
        }

        int first = Array.FindIndex(line, l => l.Count > 0), last = Array.FindLastIndex(line, l => l.Count > 0);
        if (first < 0) return new SimulatedDike(sheet, origin);
        return new SimulatedDike(sheet, origin)
        {
            Extent = ((first - half) * BinM, (last + 1 - half) * BinM),
            Hidden = [.. Hidden(near, first, last, half, enough)],
            CentreLine = [.. line.Where(l => l.Count > 0).Select(l => (l.Sum / l.Count) + origin)],
        };
    }

    private static IEnumerable<HiddenStretch> Hidden(int[,,] near, int first, int last, int half, int enough)
    {
        int from = -1;
        (bool A, bool B) state = default;
        for (int bin = first; bin <= last + 1; bin++)
        {
            (bool A, bool B) now = bin > last ? default : (Misses(near, bin, 0, enough), Misses(near, bin, 1, enough));
            if (from >= 0 && now != state)
            {
                yield return new((from - half) * BinM, (bin - half) * BinM, state.A, state.B);
                from = -1;
            }

            if (from < 0 && (now.A || now.B)) (from, state) = (bin, now);
        }
    }

    private static bool Misses(int[,,] near, int bin, int margin, int enough)
    {
        int host = 0, dike = 0;
        for (int k = Math.Max(0, bin - ReachBins); k <= Math.Min(near.GetLength(0) - 1, bin + ReachBins); k++)
        {
            host += near[k, margin, margin];
            dike += near[k, margin, 1 - margin];
        }

        return host < enough || dike < enough;
    }
}
