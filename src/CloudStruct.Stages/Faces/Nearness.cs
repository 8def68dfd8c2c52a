namespace CloudStruct.Stages.Faces;

/// <summary>Which labels come within about a distance of each other, by cubic cells of that size.</summary>
internal static class Nearness
{
    // Cell numbers wrap after some thousand cells; two far places that meet so are told apart by their planes.
    private const int Bits = 14, Offset = 1 << (Bits - 1), Mask = (1 << Bits) - 1;
    private const int LabelBits = 63 - (3 * Bits);

    /// <summary>Pairs of labels (lower first, ascending) that share a cell or touch with theirs; label 0 is left out.</summary>
    /// <param name="surface">The points.</param>
    /// <param name="label">Label per point, below 2²¹.</param>
    /// <param name="distanceM">Edge of the cells [m].</param>
    public static List<(int Low, int High)> Pairs(Surface surface, int[] label, double distanceM)
    {
        long[] cells = Cells(surface, label, distanceM);   // cell, then label, in one number; sorted, each once
        var pairs = new HashSet<(int, int)>();
        for (int i = 0; i < cells.Length; i++)
        {
            long key = cells[i] >> LabelBits;
            for (int k = i + 1; k < cells.Length && cells[k] >> LabelBits == key; k++) Put(cells[i], cells[k]);

            // Half of the 26 neighbours: the other half sees us. Cells that follow each other in x are neighbours in the list.
            for (int dz = 0; dz <= 1; dz++)
            {
                for (int dy = dz == 0 ? 0 : -1; dy <= 1; dy++)
                {
                    long middle = key + ((long)dz << (2 * Bits)) + ((long)dy << Bits);
                    int at = Array.BinarySearch(cells, (middle + (dz == 0 && dy == 0 ? 1 : -1)) << LabelBits);
                    if (at < 0) at = ~at;
                    for (; at < cells.Length && cells[at] >> LabelBits <= middle + 1; at++) Put(cells[i], cells[at]);
                }
            }
        }

        var list = pairs.ToList();
        list.Sort();
        return list;

        void Put(long one, long other)
        {
            int a = (int)(one & ((1L << LabelBits) - 1)), b = (int)(other & ((1L << LabelBits) - 1));
            if (a != b) pairs.Add(a < b ? (a, b) : (b, a));
        }
    }

    private static long[] Cells(Surface surface, int[] label, double distanceM)
    {
        var all = new List<long>();
        for (int i = 0; i < label.Length; i++)
        {
            if (label[i] == 0) continue;
            long cell = (Cell(surface.Z[i]) << (2 * Bits)) + (Cell(surface.Y[i]) << Bits) + Cell(surface.X[i]);
            long key = (cell << LabelBits) + label[i];
            if (all.Count == 0 || all[^1] != key) all.Add(key);
        }

        long[] sorted = [.. all];
        Array.Sort(sorted);
        int kept = 0;
        for (int i = 0; i < sorted.Length; i++)
        {
            if (i == 0 || sorted[i] != sorted[kept - 1]) sorted[kept++] = sorted[i];
        }

        return sorted[..kept];

        long Cell(float x) => ((long)Math.Floor(x / distanceM) + Offset) & Mask;
    }
}
