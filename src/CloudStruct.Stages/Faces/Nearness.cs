namespace CloudStruct.Stages.Faces;

/// <summary>Which labels come within about a distance of each other, by cubic cells of that size.</summary>
internal static class Nearness
{
    private const int Bits = 14, Offset = 1 << (Bits - 1), Mask = (1 << Bits) - 1;

    /// <summary>Pairs of labels (lower first, ascending) that share a cell or touch with theirs; label 0 is left out.</summary>
    /// <param name="surface">The points.</param>
    /// <param name="label">Label per point, below 2²⁰.</param>
    /// <param name="distanceM">Edge of the cells [m].</param>
    public static List<(int Low, int High)> Pairs(Surface surface, int[] label, double distanceM)
    {
        (long[] keys, int[] labels) = Cells(surface, label, distanceM);
        var pairs = new HashSet<(int, int)>();
        for (int i = 0; i < keys.Length; i++)
        {
            // Half of the 26 neighbours and the rest of the own cell: the other half sees us.
            for (int k = i + 1; k < keys.Length && keys[k] == keys[i]; k++) Put(labels[i], labels[k]);
            for (int dz = 0; dz <= 1; dz++)
            {
                for (int dy = dz == 0 ? 0 : -1; dy <= 1; dy++)
                {
                    // Cells that follow each other in x follow each other in the keys.
                    int fromX = dz == 0 && dy == 0 ? 1 : -1;
                    long middle = keys[i] + ((long)dz << (2 * Bits)) + ((long)dy << Bits);
                    int at = Array.BinarySearch(keys, middle + fromX);
                    if (at < 0) at = ~at;
                    while (at > 0 && keys[at - 1] == middle + fromX) at--;
                    for (; at < keys.Length && keys[at] <= middle + 1; at++) Put(labels[i], labels[at]);
                }
            }
        }

        var list = pairs.ToList();
        list.Sort();
        return list;

        void Put(int a, int b)
        {
            if (a != b) pairs.Add(a < b ? (a, b) : (b, a));
        }
    }

    private static (long[] Keys, int[] Labels) Cells(Surface surface, int[] label, double distanceM)
    {
        var all = new List<(long Key, int Label)>();
        (long, int) last = (long.MinValue, 0);
        for (int i = 0; i < label.Length; i++)
        {
            if (label[i] == 0) continue;
            long key = ((Cell(surface.Z[i]) << (2 * Bits)) + (Cell(surface.Y[i]) << Bits)) + Cell(surface.X[i]);
            if (last == (key, label[i])) continue;
            last = (key, label[i]);
            all.Add(last);
        }

        all.Sort();
        int kept = 0;
        for (int i = 0; i < all.Count; i++)
        {
            if (i == 0 || all[i] != all[kept - 1]) all[kept++] = all[i];
        }

        return ([.. all.Take(kept).Select(a => a.Key)], [.. all.Take(kept).Select(a => a.Label)]);

        // Wraps after some thousand cells; two far places that meet so are told apart by their planes.
        long Cell(float x) => ((long)Math.Floor(x / distanceM) + Offset) & Mask;
    }
}
