using System.Numerics;
using System.Runtime.Intrinsics;
using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Points;

namespace CloudStruct.Maths.Neighbours;

/// <summary>All neighbours of every point within a distance.</summary>
public static class RadiusNeighbours
{
    private const int CellsPerBlock = 256;

    /// <summary>Neighbours of point i are Neighbours[Starts[i]] .. Neighbours[Starts[i + 1] - 1], never itself, in the order of the grid.</summary>
    /// <param name="grid">Grid of the points, its cells not narrower than the radius.</param>
    /// <param name="x">East, in the order of the grid [m].</param>
    /// <param name="y">North [m].</param>
    /// <param name="z">Up [m].</param>
    /// <param name="radiusM">Distance, inclusive [m].</param>
    /// <param name="threads">Workers; the result is the same with any number.</param>
    /// <param name="stop">Checked per block.</param>
    /// <exception cref="ArgumentOutOfRangeException">The cells are narrower than the radius.</exception>
    public static (long[] Starts, int[] Neighbours) Of(
        SortedGrid grid, float[] x, float[] y, float[] z, float radiusM, int threads, CancellationToken stop)
    {
        ArgumentOutOfRangeException.ThrowIfGreaterThan(radiusM, grid.CellM);
        var starts = new long[x.Length + 1];
        var lists = new int[(grid.Keys.Length + CellsPerBlock - 1) / CellsPerBlock][];
        BlockParallel.For(
            grid.Keys.Length,
            threads,
            stop,
            () => new Worker(grid, x, y, z, radiusM),
            (from, to, worker) => lists[from / CellsPerBlock] = worker.Cells(from, to, starts),
            CellsPerBlock);

        // The worker left the number of neighbours of point i at i + 1.
        for (int i = 0; i < x.Length; i++) starts[i + 1] += starts[i];
        int[] all = GC.AllocateUninitializedArray<int>(checked((int)starts[^1]));
        BlockParallel.For(lists.Length, threads, stop, (from, to) =>
        {
            for (int b = from; b < to; b++) lists[b].CopyTo(all, starts[grid.Starts[b * CellsPerBlock]]);
        }, 1);
        return (starts, all);
    }

    private sealed class Worker(SortedGrid grid, float[] x, float[] y, float[] z, float radiusM)
    {
        private readonly CellWindow near = new(grid, x, y, z, 1);
        private int[] found = new int[4096];

        public int[] Cells(int from, int to, long[] counts)
        {
            int n = 0;
            near.StartAt(from);
            for (int cell = from; cell < to; cell++)
            {
                near.Gather(cell);
                for (int i = grid.Starts[cell]; i < grid.Starts[cell + 1]; i++)
                {
                    if (n + near.Count > found.Length) Array.Resize(ref found, 2 * (n + near.Count));
                    int end = Within(i, n);
                    counts[i + 1] = end - n;
                    n = end;
                }
            }

            return found.AsSpan(0, n).ToArray();
        }

        private int Within(int self, int n)
        {
            Vector256<float> px = Vector256.Create(x[self]), py = Vector256.Create(y[self]), pz = Vector256.Create(z[self]);
            Vector256<float> bound = Vector256.Create(radiusM * radiusM);
            ReadOnlySpan<float> wx = near.X.AsSpan(0, near.Padded), wy = near.Y.AsSpan(0, near.Padded), wz = near.Z.AsSpan(0, near.Padded);
            for (int c = 0; c < wx.Length; c += 8)
            {
                Vector256<float> dx = Vector256.Create(wx[c..]) - px, dy = Vector256.Create(wy[c..]) - py, dz = Vector256.Create(wz[c..]) - pz;
                uint inside = Vector256.LessThanOrEqual((dx * dx) + (dy * dy) + (dz * dz), bound).ExtractMostSignificantBits();
                while (inside != 0)
                {
                    int j = near.Index[c + BitOperations.TrailingZeroCount(inside)];
                    inside &= inside - 1;
                    if (j != self) found[n++] = j;
                }
            }

            return n;
        }
    }
}
