namespace CloudStruct.Maths.Fitting;

/// <summary>What a planar patch of points says about the errors of its own plane: residual waves, and the geometry of its pairs.</summary>
/// <remarks>Waves are polynomials over the patch, orthonormal over its points: number 0 is the mean, 1 and 2 are the slopes,
/// the rest are waves that a plane cannot absorb. For errors with covariance C(d) plus white variance w the expected square
/// of wave k is w WhiteShare[k] + sum over bins b of C(d_b) LagSums[b, k].</remarks>
public sealed record PatchRecord
{
    /// <summary>Columns of <see cref="LagSums"/>: waves, then one product, padded to whole vectors.</summary>
    public const int Lanes = 24;

    /// <summary>The column that holds the product of waves 1 and 2.</summary>
    public const int CrossLane = 21;

    /// <summary>Waves, the three of the plane included.</summary>
    public int Waves { get; init; }

    /// <summary>Squared amplitude of each wave in the residuals [m²].</summary>
    public double[] Squares { get; init; } = [];

    /// <summary>Square of a wave per unit of white variance.</summary>
    public double[] WhiteShare { get; init; } = [];

    /// <summary>Row-major, bin by <see cref="Lanes"/>: columns are waves, and the product of waves 1 and 2 at <see cref="CrossLane"/>.</summary>
    public double[] LagSums { get; init; } = [];

    /// <summary>Mean square of the residuals [m²].</summary>
    public double MeanSquare { get; init; }

    /// <summary>Standard deviation of the points along the first axis [m].</summary>
    public double SpreadU { get; init; }

    /// <summary>Standard deviation of the points along the second axis [m].</summary>
    public double SpreadV { get; init; }

    /// <summary>Turn of the first axis from the caller's u toward v [rad].</summary>
    public double Turn { get; init; }
}
