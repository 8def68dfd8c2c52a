using System.Diagnostics;

namespace CloudStruct.Records.Points;

/// <summary>Questions to the shared grid: which working point stands for a place, and which lie within a distance of it.</summary>
/// <remarks>For a question per point of the whole cloud use the kernels of Maths/Neighbours, which walk cell by cell;
/// these here search the keys anew for each place (about a microsecond).</remarks>
public static class SortedGridLookup
{
    /// <summary>Cell along one axis of a coordinate; may lie outside the grid.</summary>
    /// <param name="grid">The grid.</param>
    /// <param name="value">Local coordinate [m].</param>
    /// <param name="min">Lowest corner along the same axis [m].</param>
    public static int CellOf(SortedGrid grid, double value, float min) =>
        (int)Math.Clamp(Math.Floor((value - min) / grid.CellM), -1e9, 1e9);

    /// <summary>Index of the nearest working point, or -1 when none lies within <paramref name="maxM"/>. Of equally near
    /// points the one with the lowest index.</summary>
    /// <param name="cloud">Working cloud.</param>
    /// <param name="x">East, local [m].</param>
    /// <param name="y">North, local [m].</param>
    /// <param name="z">Up, local [m].</param>
    /// <param name="maxM">Farthest distance looked at [m].</param>
    public static int Nearest(WorkingCloud cloud, float x, float y, float z, double maxM)
    {
        SortedGrid g = cloud.Grid;
        if (g.Keys.Length == 0 || !(maxM >= 0)) return -1;
        int cx = CellOf(g, x, g.MinX), cy = CellOf(g, y, g.MinY), cz = CellOf(g, z, g.MinZ);
        int best = -1;
        double bestD2 = maxM * maxM, cell = g.CellM;
        int last = (int)Math.Min(1e8, Math.Ceiling(maxM / cell));

        // Ring by ring: everything within r cells is seen before the ring r + 1, whose points are at least r cells away.
        for (int ring = 0; ring <= last; ring++)
        {
            double nearest = Math.Max(0, ring - 1) * cell;
            if (nearest * nearest > bestD2) break;
            for (int iz = cz - ring; iz <= cz + ring; iz++)
            {
                if (iz < 0 || iz >= g.NZ) continue;
                double gapZ = Gap(z, g.MinZ, cell, iz);
                if (gapZ * gapZ > bestD2) continue;
                for (int iy = cy - ring; iy <= cy + ring; iy++)
                {
                    if (iy < 0 || iy >= g.NY) continue;
                    double gapY = Gap(y, g.MinY, cell, iy);
                    if ((gapY * gapY) + (gapZ * gapZ) > bestD2) continue;
                    bool shell = iz == cz - ring || iz == cz + ring || iy == cy - ring || iy == cy + ring;
                    if (shell || ring == 0)
                    {
                        Scan(cloud, iy, iz, cx - ring, cx + ring, x, y, z, ref best, ref bestD2);
                    }
                    else
                    {
                        Scan(cloud, iy, iz, cx - ring, cx - ring, x, y, z, ref best, ref bestD2);
                        Scan(cloud, iy, iz, cx + ring, cx + ring, x, y, z, ref best, ref bestD2);
                    }
                }
            }
        }

        return best;
    }

    // How far a place is at least from the cells of a row along one axis, less what rounding may have moved a point across a border.
    private static double Gap(double value, double min, double cell, int index)
    {
        double low = min + (index * cell);
        return Math.Max(0, Math.Max(low - value, value - (low + cell)) - (1e-4 * cell));
    }

    /// <summary>Indices of all working points within a distance, ascending within each row of cells.</summary>
    /// <param name="cloud">Working cloud.</param>
    /// <param name="x">East, local [m].</param>
    /// <param name="y">North, local [m].</param>
    /// <param name="z">Up, local [m].</param>
    /// <param name="radiusM">Distance, inclusive [m].</param>
    /// <param name="found">[out] Cleared, then filled.</param>
    public static void Within(WorkingCloud cloud, double x, double y, double z, double radiusM, List<int> found)
    {
        found.Clear();
        SortedGrid g = cloud.Grid;
        if (g.Keys.Length == 0) return;
        double r2 = radiusM * radiusM;
        int x0 = Math.Max(0, CellOf(g, x - radiusM, g.MinX)), x1 = Math.Min(g.NX - 1, CellOf(g, x + radiusM, g.MinX));
        int y0 = Math.Max(0, CellOf(g, y - radiusM, g.MinY)), y1 = Math.Min(g.NY - 1, CellOf(g, y + radiusM, g.MinY));
        int z0 = Math.Max(0, CellOf(g, z - radiusM, g.MinZ)), z1 = Math.Min(g.NZ - 1, CellOf(g, z + radiusM, g.MinZ));
        if (x1 < x0) return;
        for (int iz = z0; iz <= z1; iz++)
        {
            for (int iy = y0; iy <= y1; iy++)
            {
                (int from, int to) = Row(g, iy, iz, x0, x1);
                for (int i = from; i < to; i++)
                {
                    double dx = cloud.X[i] - x, dy = cloud.Y[i] - y, dz = cloud.Z[i] - z;
                    if ((dx * dx) + (dy * dy) + (dz * dz) <= r2) found.Add(i);
                }
            }
        }
    }

    /// <summary>Points [from, to) of the cells x0..x1 of one row: they lie together in memory.</summary>
    /// <param name="g">The grid.</param>
    /// <param name="iy">Row, inside the grid.</param>
    /// <param name="iz">Layer, inside the grid.</param>
    /// <param name="x0">First cell; may lie outside.</param>
    /// <param name="x1">Last cell; may lie outside.</param>
    public static (int From, int To) Row(SortedGrid g, int iy, int iz, int x0, int x1)
    {
        Debug.Assert(iy >= 0 && iy < g.NY && iz >= 0 && iz < g.NZ, "row outside the grid");
        x0 = Math.Max(0, x0);
        x1 = Math.Min(g.NX - 1, x1);
        if (x1 < x0) return (0, 0);
        long row = (((long)iz * g.NY) + iy) * g.NX;
        int first = LowerBound(g.Keys, row + x0);
        int end = first;
        while (end < g.Keys.Length && g.Keys[end] <= row + x1) end++;
        return (g.Starts[first], g.Starts[end]);
    }

    /// <summary>First position whose key is not below the wanted one; the length when all are.</summary>
    public static int LowerBound(long[] keys, long wanted)
    {
        int low = 0, high = keys.Length;
        while (low < high)
        {
            int middle = (int)(((uint)low + (uint)high) >> 1);
            if (keys[middle] < wanted) low = middle + 1;
            else high = middle;
        }

        return low;
    }

    private static void Scan(
        WorkingCloud cloud, int iy, int iz, int x0, int x1, float x, float y, float z, ref int best, ref double bestD2)
    {
        (int from, int to) = Row(cloud.Grid, iy, iz, x0, x1);
        for (int i = from; i < to; i++)
        {
            double dx = (double)cloud.X[i] - x, dy = (double)cloud.Y[i] - y, dz = (double)cloud.Z[i] - z;
            double d2 = (dx * dx) + (dy * dy) + (dz * dz);
            if (d2 < bestD2 || (d2 == bestD2 && (best < 0 || i < best)))
            {
                best = i;
                bestD2 = d2;
            }
        }
    }
}
