using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Points;

namespace CloudStruct.Maths.Neighbours;

/// <summary>The k nearest neighbours of every point, however far they lie.</summary>
/// <remarks>Cells of three spacings serve nearly all points (<see cref="NearestNeighbours"/>); those whose k neighbours do not lie within two
/// cells look again in cells four times as wide, and so on, so that an outlier costs little and nobody else anything.</remarks>
public static class ExactNeighbours
{
    private const double CellSpacings = 3;
    private const float Wider = 4;

    /// <summary>Row-major, k a point, nearest first, never itself; -1 only where the cloud holds fewer than k other points.</summary>
    /// <param name="x">East [m], finite, in any order.</param>
    /// <param name="y">North [m].</param>
    /// <param name="z">Up [m].</param>
    /// <param name="k">Neighbours wanted, 1 to 64.</param>
    /// <param name="threads">Workers; the result is the same with any number.</param>
    /// <param name="stop">Checked per block.</param>
    /// <returns>Numbers of points as given. Of equally distant points those come first that are first in the order of cells.</returns>
    public static int[] Of(float[] x, float[] y, float[] z, int k, int threads, CancellationToken stop)
    {
        int n = x.Length;
        int[] found = GC.AllocateUninitializedArray<int>(checked(n * k));
        Array.Fill(found, -1);
        double spacing = PointSpacing.Rough(x, y, z);
        float cell = (float)(CellSpacings * (spacing > 0 ? spacing : 1));
        bool[]? wanted = null;
        int others = Math.Min(k, n - 1);
        for (int left = n; left > 0 && others > 0; cell *= Wider)
        {
            left = Pass(x, y, z, k, others, cell, found, ref wanted, threads, stop);
        }

        return found;
    }

    // Fills the rows of the points wanted and leaves wanted those that are still short; gives how many.
    private static int Pass(
        float[] x, float[] y, float[] z, int k, int others, float cell, int[] found, ref bool[]? wanted, int threads, CancellationToken stop)
    {
        (SortedGrid grid, int[] order) = GridBuilder.Build(x, y, z, cell, threads);
        int n = order.Length;
        float[] sx = new float[n], sy = new float[n], sz = new float[n];
        bool[]? sorted = wanted is null ? null : new bool[n];
        bool[]? before = wanted;
        BlockParallel.For(n, threads, stop, (from, to) =>
        {
            for (int i = from; i < to; i++)
            {
                int o = order[i];
                (sx[i], sy[i], sz[i]) = (x[o], y[o], z[o]);
                if (sorted is not null) sorted[i] = before![o];
            }
        });
        int[] rows = GC.AllocateUninitializedArray<int>(n * k);
        NearestNeighbours.Fill(grid, sx, sy, sz, k, rows, sorted, threads, stop);
        var after = new bool[n];
        int[] left = BlockParallel.Map(n, threads, stop, (from, to) =>
        {
            int still = 0;
            for (int i = from; i < to; i++)
            {
                if (sorted is not null && !sorted[i]) continue;
                ReadOnlySpan<int> row = rows.AsSpan(i * k, k);
                if (row[others - 1] < 0)
                {
                    after[order[i]] = true;
                    still++;
                    continue;
                }

                Span<int> target = found.AsSpan(order[i] * k, k);
                for (int j = 0; j < others; j++) target[j] = order[row[j]];
            }

            return still;
        });
        wanted = after;
        return left.Sum();
    }
}
