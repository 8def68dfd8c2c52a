using CloudStruct.Records.Points;

namespace CloudStruct.Maths.Neighbours;

/// <summary>The points of a cell and of all cells up to some rings around it, copied side by side for the kernels.</summary>
/// <remarks>Cells must be visited in ascending order after <see cref="StartAt"/>: a cursor per row then only moves
/// forward, and no key is searched. One window per worker.</remarks>
public sealed class CellWindow
{
    private readonly SortedGrid grid;
    private readonly float[] allX, allY, allZ;
    private readonly long[] rowOffset;
    private readonly int[] cursor;

    /// <summary>A window over sorted points.</summary>
    /// <param name="grid">Built with a rim of at least <paramref name="ring"/> cells.</param>
    /// <param name="x">East, in the order of the grid [m].</param>
    /// <param name="y">North [m].</param>
    /// <param name="z">Up [m].</param>
    /// <param name="ring">Cells looked at to each side, 1 or 2.</param>
    public CellWindow(SortedGrid grid, float[] x, float[] y, float[] z, int ring)
    {
        ArgumentOutOfRangeException.ThrowIfGreaterThan(ring, GridBuilder.Margin);
        this.grid = grid;
        (allX, allY, allZ) = (x, y, z);
        Ring = ring;
        int side = (2 * ring) + 1;
        rowOffset = new long[side * side];
        cursor = new int[side * side];
        int r = 0;
        for (int dz = -ring; dz <= ring; dz++)
        {
            for (int dy = -ring; dy <= ring; dy++) rowOffset[r++] = (((long)dz * grid.NY) + dy) * grid.NX;
        }
    }

    /// <summary>Cells to each side.</summary>
    public int Ring { get; }

    /// <summary>Points in the window.</summary>
    public int Count { get; private set; }

    /// <summary>East of the points [m]; padded beyond <see cref="Count"/> by far-off places up to a multiple of eight.</summary>
    public float[] X { get; private set; } = new float[1024];

    /// <summary>North [m].</summary>
    public float[] Y { get; private set; } = new float[1024];

    /// <summary>Up [m].</summary>
    public float[] Z { get; private set; } = new float[1024];

    /// <summary>Index of each point in the cloud.</summary>
    public int[] Index { get; private set; } = new int[1024];

    /// <summary><see cref="Count"/> rounded up to a multiple of eight: lanes beyond it hold places 1e18 m away.</summary>
    public int Padded => (Count + 7) & ~7;

    /// <summary>Sets the cursors for a cell (its place in the grid's keys) and those after it.</summary>
    public void StartAt(int cell)
    {
        for (int r = 0; r < cursor.Length; r++)
        {
            cursor[r] = SortedGridLookup.LowerBound(grid.Keys, grid.Keys[cell] + rowOffset[r] - Ring);
        }
    }

    /// <summary>Fills the window around a cell, not before the last one given.</summary>
    public void Gather(int cell)
    {
        long[] keys = grid.Keys;
        int[] starts = grid.Starts;
        Count = 0;
        for (int r = 0; r < cursor.Length; r++)
        {
            long from = keys[cell] + rowOffset[r] - Ring, to = from + (2 * Ring);
            int c = cursor[r];
            while (c < keys.Length && keys[c] < from) c++;
            cursor[r] = c;
            int end = c;
            while (end < keys.Length && keys[end] <= to) end++;
            if (end > c) Append(starts[c], starts[end]);
        }

        for (int i = Count; i < Padded; i++) X[i] = Y[i] = Z[i] = 1e18f;
    }

    private void Append(int from, int to)
    {
        int n = to - from;
        if (Count + n + 8 > X.Length) Grow(Count + n + 8);
        Array.Copy(allX, from, X, Count, n);
        Array.Copy(allY, from, Y, Count, n);
        Array.Copy(allZ, from, Z, Count, n);
        for (int i = 0; i < n; i++) Index[Count + i] = from + i;
        Count += n;
    }

    private void Grow(int least)
    {
        int size = Math.Max(least, 2 * X.Length);
        float[] x = X, y = Y, z = Z;
        int[] index = Index;
        Array.Resize(ref x, size);
        Array.Resize(ref y, size);
        Array.Resize(ref z, size);
        Array.Resize(ref index, size);
        (X, Y, Z, Index) = (x, y, z, index);
    }
}
