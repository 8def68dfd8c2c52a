namespace CloudStruct.Records.Points;

/// <summary>Points sorted into cubic cells: the one neighbourhood structure that all stages share.</summary>
/// <remarks>Cell key = (iz * NY + iy) * NX + ix, so cells that follow each other in x lie together in memory. Points are
/// stored in order of key: those of cell c are Starts[c] .. Starts[c+1]-1.</remarks>
public sealed record SortedGrid
{
    /// <summary>Lowest corner of the grid, local [m].</summary>
    public float MinX { get; init; }

    /// <summary>See <see cref="MinX"/>.</summary>
    public float MinY { get; init; }

    /// <summary>See <see cref="MinX"/>.</summary>
    public float MinZ { get; init; }

    /// <summary>Edge of a cell [m].</summary>
    public float CellM { get; init; }

    /// <summary>Cells along x.</summary>
    public int NX { get; init; }

    /// <summary>Cells along y.</summary>
    public int NY { get; init; }

    /// <summary>Cells along z.</summary>
    public int NZ { get; init; }

    /// <summary>Keys of occupied cells, ascending.</summary>
    public long[] Keys { get; init; } = [];

    /// <summary>First point of each occupied cell, and the number of points at the end: one longer than <see cref="Keys"/>.</summary>
    public int[] Starts { get; init; } = [];
}
