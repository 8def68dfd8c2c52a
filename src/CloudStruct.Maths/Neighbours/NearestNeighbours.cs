using System.Numerics;
using System.Runtime.Intrinsics;
using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Points;

namespace CloudStruct.Maths.Neighbours;

/// <summary>The k nearest neighbours of every point of a sorted grid, exact within two cells.</summary>
/// <remarks>Cell by cell: the points of the 27 cells around are gathered once for all points of a cell; only points that
/// find fewer than k within one cell edge look at the 125 cells around. Distances are compared as (squared distance,
/// index) packed in one integer, so ties go to the lower index and no order of work shows.</remarks>
public static class NearestNeighbours
{
    private const int CellsPerBlock = 256;

    /// <summary>Fills k neighbour indices a point, nearest first, never itself, -1 where fewer lie within two cell edges.</summary>
    /// <param name="grid">Grid of the points.</param>
    /// <param name="x">East, in the order of the grid [m].</param>
    /// <param name="y">North [m].</param>
    /// <param name="z">Up [m].</param>
    /// <param name="k">Neighbours wanted, 1 to 64.</param>
    /// <param name="neighbours">[out] Row-major, k a point.</param>
    /// <param name="wanted">Which points to do; null for all. Rows of others are left alone.</param>
    /// <param name="threads">Workers.</param>
    /// <param name="stop">Checked per block of cells.</param>
    public static void Fill(
        SortedGrid grid, float[] x, float[] y, float[] z, int k, int[] neighbours, bool[]? wanted, int threads, CancellationToken stop)
    {
        ArgumentOutOfRangeException.ThrowIfGreaterThan(k, 64);
        BlockParallel.For(
            grid.Keys.Length,
            threads,
            stop,
            () => new Worker(grid, x, y, z, k, neighbours, wanted),
            (from, to, worker) => worker.Cells(from, to),
            CellsPerBlock);
    }

    private sealed class Worker(SortedGrid grid, float[] x, float[] y, float[] z, int k, int[] neighbours, bool[]? wanted)
    {
        private readonly CellWindow near = new(grid, x, y, z, 1);
        private readonly CellWindow far = new(grid, x, y, z, 2);
        private readonly ulong[] best = new ulong[k];
        private int found;

        public void Cells(int from, int to)
        {
            near.StartAt(from);
            far.StartAt(from);
            float edge2 = grid.CellM * grid.CellM;
            for (int cell = from; cell < to; cell++)
            {
                bool nearReady = false, farReady = false;
                float guess = edge2;
                for (int i = grid.Starts[cell]; i < grid.Starts[cell + 1]; i++)
                {
                    if (wanted is not null && !wanted[i]) continue;
                    if (!nearReady) near.Gather(cell);
                    nearReady = true;

                    // The neighbour's own reach, a little widened, usually holds k points and few more: far fewer to sort.
                    Select(near, i, guess);
                    if (found < k && guess < edge2) Select(near, i, edge2);
                    if (found < k)
                    {
                        if (!farReady) far.Gather(cell);
                        farReady = true;
                        Select(far, i, 4 * edge2);
                    }
                    else
                    {
                        guess = Math.Min(edge2, 1.3f * Distance2(best[k - 1]));
                    }

                    for (int j = 0; j < k; j++) neighbours[((long)i * k) + j] = j < found ? (int)(uint)best[j] : -1;
                }
            }
        }

        private static float Distance2(ulong packed) => BitConverter.UInt32BitsToSingle((uint)(packed >> 32));

        private void Select(CellWindow window, int self, float limit)
        {
            found = 0;
            Vector256<float> px = Vector256.Create(x[self]), py = Vector256.Create(y[self]), pz = Vector256.Create(z[self]);
            Vector256<float> bound = Vector256.Create(limit);
            ReadOnlySpan<float> wx = window.X, wy = window.Y, wz = window.Z;
            for (int c = 0; c < window.Padded; c += 8)
            {
                Vector256<float> dx = Vector256.Create(wx[c..]) - px;
                Vector256<float> dy = Vector256.Create(wy[c..]) - py;
                Vector256<float> dz = Vector256.Create(wz[c..]) - pz;
                Vector256<float> d2 = (dx * dx) + (dy * dy) + (dz * dz);
                uint inside = Vector256.LessThanOrEqual(d2, bound).ExtractMostSignificantBits();
                while (inside != 0)
                {
                    int lane = BitOperations.TrailingZeroCount(inside);
                    inside &= inside - 1;
                    int j = window.Index[c + lane];
                    if (j != self) Insert(((ulong)BitConverter.SingleToUInt32Bits(d2.GetElement(lane)) << 32) | (uint)j);
                }
            }
        }

        // Positive floats order like their bits. Straight insertion: sixteen keys lie in two cache lines.
        private void Insert(ulong key)
        {
            int at;
            if (found < k)
            {
                at = found++;
            }
            else
            {
                if (key >= best[k - 1]) return;
                at = k - 1;
            }

            while (at > 0 && best[at - 1] > key)
            {
                best[at] = best[at - 1];
                at--;
            }

            best[at] = key;
        }
    }
}
