using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Points;

namespace CloudStruct.Maths.Neighbours;

/// <summary>Sorts points into the cubic cells of a <see cref="SortedGrid"/>.</summary>
public static class GridBuilder
{
    /// <summary>Empty cells kept around the points, so that a key plus or minus this many cells never runs into the next row.</summary>
    public const int Margin = 2;

    /// <summary>The grid, and the order in which the points have to be stored for it.</summary>
    /// <param name="x">East [m], finite.</param>
    /// <param name="y">North [m].</param>
    /// <param name="z">Up [m].</param>
    /// <param name="cellM">Edge of a cell, above 0. Extents over the edge must stay below two million cells an axis.</param>
    /// <param name="threads">Workers; the result is the same with any number.</param>
    /// <returns>Order[k] is the old index of the point to be stored at k. Points of one cell keep their old order.</returns>
    public static (SortedGrid Grid, int[] Order) Build(float[] x, float[] y, float[] z, float cellM, int threads = 1)
    {
        if (x.Length == 0) return (new SortedGrid { CellM = cellM, Starts = [0] }, []);
        (float minX, int nx) = Axis(x, cellM);
        (float minY, int ny) = Axis(y, cellM);
        (float minZ, int nz) = Axis(z, cellM);
        var shape = new SortedGrid { MinX = minX, MinY = minY, MinZ = minZ, CellM = cellM, NX = nx, NY = ny, NZ = nz };
        var keys = new long[x.Length];
        BlockParallel.For(keys.Length, threads, CancellationToken.None, (from, to) =>
        {
            for (int i = from; i < to; i++)
            {
                long ix = SortedGridLookup.CellOf(shape, x[i], minX);
                long iy = SortedGridLookup.CellOf(shape, y[i], minY);
                long iz = SortedGridLookup.CellOf(shape, z[i], minZ);
                keys[i] = (((iz * ny) + iy) * nx) + ix;
            }
        });

        int[] order = RadixOrder.Of(keys, threads);
        var cellKeys = new List<long>(order.Length / 4);
        var starts = new List<int>(order.Length / 4);
        long before = -1;
        for (int k = 0; k < order.Length; k++)
        {
            long key = keys[order[k]];
            if (key == before) continue;
            before = key;
            cellKeys.Add(key);
            starts.Add(k);
        }

        starts.Add(order.Length);
        return (shape with { Keys = [.. cellKeys], Starts = [.. starts] }, order);
    }

    private static (float Min, int Cells) Axis(ReadOnlySpan<float> values, float cellM)
    {
        float min = float.MaxValue, max = float.MinValue;
        foreach (float v in values)
        {
            min = Math.Min(min, v);
            max = Math.Max(max, v);
        }

        // Rounded down once more: the float nearest to (min - margin) may lie above it.
        float corner = MathF.BitDecrement((float)(min - ((double)Margin * cellM)));
        double cells = Math.Floor(((double)max - corner) / cellM) + 1 + Margin;
        if (!(cells < 2_000_000)) throw new ArgumentOutOfRangeException(nameof(cellM), cellM, "too small for the extent of the points");
        return (corner, (int)cells);
    }
}
