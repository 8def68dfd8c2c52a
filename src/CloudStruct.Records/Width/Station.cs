using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Width;

/// <summary>One row of width.csv.</summary>
public sealed record Station
{
    /// <summary>Number of the dike.</summary>
    public int Dike { get; init; }

    /// <summary>1, 2, ... along the dike.</summary>
    public int Number { get; init; }

    /// <summary>Chainage [m].</summary>
    public double ChainageM { get; init; }

    /// <summary>Place on the centre line, local [m].</summary>
    public Vec3 Place { get; init; }

    /// <summary>Attitude of the dike there; null when unconstrained.</summary>
    public Attitude? Attitude { get; init; }

    /// <summary>Horizontal distance of the margins across strike [m]; null when a margin is hidden.</summary>
    public double? ApparentWidthM { get; init; }

    /// <summary>Distance of the margins along the normal [m].</summary>
    public double? TrueWidthM { get; init; }

    /// <summary>95 % limits, internal errors [m].</summary>
    public double? TrueWidthLow95M { get; init; }

    /// <summary>95 % limits, internal errors [m].</summary>
    public double? TrueWidthHigh95M { get; init; }

    /// <summary>What could be measured.</summary>
    public StationStatus Status { get; init; }

    /// <summary>Lower bound from what is seen, where a margin is hidden [m].</summary>
    public double? VisibleWidthM { get; init; }

    /// <summary>Along the ground, square to the trace: an upper bound of the true width [m].</summary>
    public double? ExposedWidthM { get; init; }

    /// <summary>Continuous with chainage [deg].</summary>
    public double? TrendAlongDeg { get; init; }

    /// <summary>Tilt from vertical, positive when the top leans toward B [deg].</summary>
    public double? LeanToBDeg { get; init; }

    /// <summary>95 % limits with the common errors [m].</summary>
    public double? TrueWidthTotalLow95M { get; init; }

    /// <summary>95 % limits with the common errors [m].</summary>
    public double? TrueWidthTotalHigh95M { get; init; }

    /// <summary>Margin A at the station, local [m]; null when hidden.</summary>
    public Vec3? AtA { get; init; }

    /// <summary>Margin B at the station, local [m]; null when hidden.</summary>
    public Vec3? AtB { get; init; }
}
