using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Points;

/// <summary>The evenly spaced cloud on which everything is measured, in the order of its grid.</summary>
public sealed record WorkingCloud
{
    /// <summary>Neighbours kept per point.</summary>
    public const int K = 16;

    /// <summary>The survey frame.</summary>
    public SurveyFrame Frame { get; init; } = new();

    /// <summary>East, local [m].</summary>
    public float[] X { get; init; } = [];

    /// <summary>North, local [m].</summary>
    public float[] Y { get; init; } = [];

    /// <summary>Up, local [m].</summary>
    public float[] Z { get; init; } = [];

    /// <summary>0-255; empty without colour.</summary>
    public byte[] Red { get; init; } = [];

    /// <summary>0-255; empty without colour.</summary>
    public byte[] Green { get; init; } = [];

    /// <summary>0-255; empty without colour.</summary>
    public byte[] Blue { get; init; } = [];

    /// <summary>Commonest classification of the input points it stands for.</summary>
    public byte[] SourceClass { get; init; } = [];

    /// <summary>Input points it stands for.</summary>
    public int[] Support { get; init; } = [];

    /// <summary>Distance between neighbours aimed at [m].</summary>
    public double SpacingM { get; init; }

    /// <summary>Shared grid: the points above are stored in its order.</summary>
    public SortedGrid Grid { get; init; } = new();

    /// <summary>Row-major, <see cref="K"/> a point: indices of the nearest neighbours (never itself), nearest first;
    /// -1 where fewer lie within the search radius.</summary>
    public int[] Neighbours { get; init; } = [];

    /// <summary>Largest distance looked at for <see cref="Neighbours"/> [m].</summary>
    public double NeighbourRadiusM { get; init; }

    /// <summary>Input points that were dropped as stray (few neighbours), with those they stand for.</summary>
    public long StrayPoints { get; init; }

    /// <summary>Number of points.</summary>
    public int Count => X.Length;

    /// <summary>Whether colour is there.</summary>
    public bool HasColour => Red.Length > 0;

    /// <summary>Place of point i, local [m].</summary>
    public Vec3 Place(int i) => new(X[i], Y[i], Z[i]);
}
