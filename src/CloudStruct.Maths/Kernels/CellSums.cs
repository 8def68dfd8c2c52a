using System.Runtime.Intrinsics;
using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Fitting;
using CloudStruct.Maths.Neighbours;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Maths.Kernels;

/// <summary>Moments of the points of each cell, so that the scatter over a wide radius costs some cells, not thousands of points.</summary>
/// <remarks>Count, centroid and central second moments, in double precision: cells are joined without loss of digits.</remarks>
public sealed class CellSums
{
    private const int Fields = 12;   // n, centroid x y z, central sums xx xy xz yy yz zz, and two zeros up to whole vectors

    private readonly SortedGrid grid;
    private readonly double[] sums;

    private CellSums(SortedGrid grid, double[] sums)
    {
        this.grid = grid;
        this.sums = sums;
    }

    /// <summary>Number of cells.</summary>
    public int Count => grid.Keys.Length;

    /// <summary>Edge of a cell [m].</summary>
    public double CellM => grid.CellM;

    /// <summary>Sums over the cells of a sorted cloud.</summary>
    /// <param name="grid">Its grid.</param>
    /// <param name="x">East, in the order of the grid [m].</param>
    /// <param name="y">North [m].</param>
    /// <param name="z">Up [m].</param>
    /// <param name="threads">Workers.</param>
    /// <param name="stop">Checked per block.</param>
    public static CellSums Of(SortedGrid grid, float[] x, float[] y, float[] z, int threads, CancellationToken stop)
    {
        var sums = new double[Fields * grid.Keys.Length];
        BlockParallel.For(
            grid.Keys.Length,
            threads,
            stop,
            (from, to) =>
            {
                for (int c = from; c < to; c++)
                {
                    int first = grid.Starts[c], end = grid.Starts[c + 1], n = end - first;
                    double mx = 0, my = 0, mz = 0;
                    for (int i = first; i < end; i++)
                    {
                        mx += x[i];
                        my += y[i];
                        mz += z[i];
                    }

                    Span<double> s = sums.AsSpan(Fields * c, Fields);
                    (s[0], s[1], s[2], s[3]) = (n, mx / n, my / n, mz / n);
                    for (int i = first; i < end; i++) AddCentral(s, 1, x[i] - s[1], y[i] - s[2], z[i] - s[3]);
                }
            });
        return new CellSums(grid, sums);
    }

    /// <summary>Sums of cells twice as wide in every direction.</summary>
    /// <param name="parent">[out] The wide cell of each of these cells.</param>
    public CellSums Coarser(out int[] parent)
    {
        float edge = 2 * grid.CellM;
        var shape = new SortedGrid
        {
            MinX = grid.MinX,
            MinY = grid.MinY,
            MinZ = grid.MinZ,
            CellM = edge,
            NX = (grid.NX / 2) + 1,
            NY = (grid.NY / 2) + 1,
            NZ = (grid.NZ / 2) + 1,
        };
        var keys = new long[Count];
        for (int c = 0; c < Count; c++)
        {
            (long ix, long iy, long iz) = Place(grid, grid.Keys[c]);
            keys[c] = ((((iz >> 1) * shape.NY) + (iy >> 1)) * shape.NX) + (ix >> 1);
        }

        int[] order = RadixOrder.Of(keys);
        parent = new int[Count];
        var wideKeys = new List<long>();
        var wideSums = new List<double>();
        Span<double> total = stackalloc double[Fields];
        for (int from = 0; from < order.Length;)
        {
            long key = keys[order[from]];
            int to = from;
            total.Clear();
            while (to < order.Length && keys[order[to]] == key)
            {
                ReadOnlySpan<double> s = Of(order[to]);
                parent[order[to++]] = wideKeys.Count;
                total[0] += s[0];
                for (int k = 1; k < 4; k++) total[k] += s[0] * s[k];
            }

            for (int k = 1; k < 4; k++) total[k] /= total[0];
            for (int o = from; o < to; o++)
            {
                ReadOnlySpan<double> s = Of(order[o]);
                for (int k = 4; k < 10; k++) total[k] += s[k];
                AddCentral(total, s[0], s[1] - total[1], s[2] - total[2], s[3] - total[3]);
            }

            wideKeys.Add(key);
            foreach (double t in total) wideSums.Add(t);
            from = to;
        }

        return new CellSums(shape with { Keys = [.. wideKeys] }, [.. wideSums]);
    }

    /// <summary>For each cell the count, mean and covariance of the points of all cells whose centroid lies within the
    /// radius of its own: a ball whose rim is as rough as the cells are wide.</summary>
    /// <param name="radiusM">Radius; best at least 2.5 cells.</param>
    /// <param name="threads">Workers.</param>
    /// <param name="stop">Checked per block.</param>
    /// <param name="result">Called once per cell, from any worker: cell, count, mean [m], covariance [m²].</param>
    public void Around(double radiusM, int threads, CancellationToken stop, Action<int, double, Vec3, Symmetric3> result)
    {
        int ring = (int)Math.Ceiling(radiusM / grid.CellM) + 1;
        var rows = new List<(int Dy, int Dz)>();
        for (int dz = -ring; dz <= ring; dz++)
        {
            for (int dy = -ring; dy <= ring; dy++)
            {
                // A row whose nearest edge is farther than the radius can hold no centroid within it.
                double gapY = Math.Max(0, Math.Abs(dy) - 1) * CellM, gapZ = Math.Max(0, Math.Abs(dz) - 1) * CellM;
                if ((gapY * gapY) + (gapZ * gapZ) <= radiusM * radiusM) rows.Add((dy, dz));
            }
        }

        (int Dy, int Dz)[] all = [.. rows];
        BlockParallel.For(
            Count,
            threads,
            stop,
            () => new int[all.Length],
            (from, to, cursor) =>
            {
                // A cursor per row of cells: cells are visited in ascending order, so it only moves forward.
                Array.Fill(cursor, -1);
                for (int c = from; c < to; c++) Around(c, radiusM, ring, all, cursor, result);
            },
            512);
    }

    private void Around(
        int c, double radiusM, int ring, (int Dy, int Dz)[] rows, int[] cursor, Action<int, double, Vec3, Symmetric3> result)
    {
        long[] keys = grid.Keys;
        (long ix, long iy, long iz) = Place(grid, keys[c]);
        long x0 = Math.Max(0, ix - ring), x1 = Math.Min(grid.NX - 1, ix + ring);
        double hx = sums[(Fields * c) + 1], hy = sums[(Fields * c) + 2], hz = sums[(Fields * c) + 3], reach2 = radiusM * radiusM;

        // Count and first moments, second moments, and the last two of those: a lane each, so that no sum changes its order.
        Vector256<double> first = default, second = default;
        Vector128<double> third = default;
        for (int r = 0; r < cursor.Length; r++)
        {
            (int stepY, int stepZ) = rows[r];
            long ry = iy + stepY, rz = iz + stepZ;
            if (ry < 0 || ry >= grid.NY || rz < 0 || rz >= grid.NZ) continue;
            long row = ((rz * grid.NY) + ry) * grid.NX, low = row + x0, high = row + x1;
            int k = cursor[r] < 0 ? SortedGridLookup.LowerBound(keys, low) : cursor[r];
            while (k < keys.Length && keys[k] < low) k++;
            cursor[r] = k;
            for (; k < keys.Length && keys[k] <= high; k++)
            {
                ReadOnlySpan<double> s = sums.AsSpan(Fields * k, Fields);
                double dx = s[1] - hx, dy = s[2] - hy, dz = s[3] - hz;
                if ((dx * dx) + (dy * dy) + (dz * dz) > reach2) continue;
                double w = s[0];
                Vector256<double> weight = Vector256.Create(w);
                first += weight * Vector256.Create(1, dx, dy, dz);
                second += Vector256.Create(s[4..]) + (weight * Vector256.Create(dx, dx, dx, dy) * Vector256.Create(dx, dy, dz, dy));
                third += Vector128.Create(s[8..]) + (Vector128.Create(w * dy, w * dz) * Vector128.Create(dz));
            }
        }

        double n = first[0], x = first[1], y = first[2], z = first[3];
        double xx = second[0], xy = second[1], xz = second[2], yy = second[3], yz = third[0], zz = third[1];
        double mx = x / n, my = y / n, mz = z / n;
        result(
            c,
            n,
            new Vec3(hx + mx, hy + my, hz + mz),
            new Symmetric3(
                (xx / n) - (mx * mx), (xy / n) - (mx * my), (xz / n) - (mx * mz), (yy / n) - (my * my), (yz / n) - (my * mz), (zz / n) - (mz * mz)));
    }

    private ReadOnlySpan<double> Of(int cell) => sums.AsSpan(Fields * cell, Fields);

    private static void AddCentral(Span<double> s, double weight, double dx, double dy, double dz)
    {
        s[4] += weight * dx * dx;
        s[5] += weight * dx * dy;
        s[6] += weight * dx * dz;
        s[7] += weight * dy * dy;
        s[8] += weight * dy * dz;
        s[9] += weight * dz * dz;
    }

    private static (long X, long Y, long Z) Place(SortedGrid g, long key) => (key % g.NX, key / g.NX % g.NY, key / g.NX / g.NY);
}
