namespace CloudStruct.Stages.Classify;

/// <summary>Pieces of cloud that nothing joins.</summary>
internal static class SeparateClouds
{
    private const int Block = 3;

    /// <summary>Piece of every patch, named by its lowest patch. Patches no more than two cells apart along each axis belong together.</summary>
    /// <remarks>All patches within a block of three cells a side lie that near, so blocks are joined, not patches; two blocks that are
    /// one already need not be looked at. (Asking each patch for its 124 neighbours took a twentieth of the stage.)</remarks>
    /// <param name="cell">Lattice place of each patch, three integers.</param>
    public static int[] Of(int[] cell)
    {
        unchecked
        {
            int n = cell.Length / 3;
            int[] blockOf = new int[n], next = new int[n];
            var map = new CellMap(Math.Max(16, n / 4));
            var first = new List<int>();
            var corner = new List<(int X, int Y, int Z)>();
            for (int i = n - 1; i >= 0; i--)
            {
                (int X, int Y, int Z) at = (Down(cell[3 * i]), Down(cell[(3 * i) + 1]), Down(cell[(3 * i) + 2]));
                int b = blockOf[i] = map.FindOrAdd(at.X, at.Y, at.Z);
                if (b == first.Count)
                {
                    first.Add(-1);
                    corner.Add(at);
                }

                next[i] = first[b];   // the patches of a block as a list, the lowest first
                first[b] = i;
            }

            var root = new int[first.Count];
            for (int b = 0; b < root.Length; b++) root[b] = b;
            for (int b = 0; b < root.Length; b++)
            {
                (int x, int y, int z) = corner[b];
                for (int k = 0; k < 13; k++)
                {
                    int other = map.Find(x + (k % 3) - 1, y + (k / 3 % 3) - 1, z + (k / 9) - 1);
                    if (other < 0 || Root(root, b) == Root(root, other) || !Touch(b, other)) continue;
                    (int p, int q) = (Root(root, b), Root(root, other));
                    // The root is the block that holds the lowest patch.
                    if (first[p] < first[q]) root[q] = p;
                    else root[p] = q;
                }
            }

            var piece = new int[n];
            for (int i = 0; i < n; i++) piece[i] = first[Root(root, blockOf[i])];
            return piece;

            bool Touch(int a, int b)
            {
                for (int i = first[a]; i >= 0; i = next[i])
                {
                    for (int j = first[b]; j >= 0; j = next[j])
                    {
                        if (Near(cell[3 * i] - cell[3 * j]) && Near(cell[(3 * i) + 1] - cell[(3 * j) + 1]) && Near(cell[(3 * i) + 2] - cell[(3 * j) + 2])) return true;
                    }
                }

                return false;
            }
        }
    }

    private static bool Near(int d) => d is >= -2 and <= 2;

    private static int Down(int a) => a >= 0 ? a / Block : -((Block - 1 - a) / Block);

    private static int Root(int[] root, int b)
    {
        while (root[b] != b) b = root[b] = root[root[b]];
        return b;
    }
}
