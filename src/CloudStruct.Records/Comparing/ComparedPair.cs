using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Comparing;

/// <summary>One thing measured twice.</summary>
public sealed record ComparedPair
{
    /// <summary>face, contact or width.</summary>
    public required string Kind { get; init; }

    /// <summary>Set of the face, dike and margin of the contact; empty for none.</summary>
    public string Group { get; init; } = "";

    /// <summary>Its name in the first results.</summary>
    public required string First { get; init; }

    /// <summary>Its name in the second results or among the readings.</summary>
    public required string Second { get; init; }

    /// <summary>Place in the first [m], map coordinates.</summary>
    public Vec3 Place { get; init; }

    /// <summary>How far apart the two are [m].</summary>
    public double DistanceM { get; init; }

    /// <summary>Area of the face in the first [m²]; 0 for others.</summary>
    public double AreaM2 { get; init; }

    /// <summary>Angle between the two as they are [deg]; NaN for widths.</summary>
    public double AngleDeg { get; init; } = double.NaN;

    /// <summary>Angle that is left when the common rotation is taken off [deg]; NaN for widths.</summary>
    public double RestDeg { get; init; } = double.NaN;

    /// <summary>Difference of the widths, second minus first [m]; NaN for planes.</summary>
    public double WidthDifferenceM { get; init; } = double.NaN;

    /// <summary>The difference over its stated standard deviation: Mahalanobis distance in two dimensions for planes, in one for widths.</summary>
    public double Normalised { get; init; }

    /// <summary>Whether the difference lies in its stated 95 % region.</summary>
    public bool Within95 { get; init; }

    /// <summary>Whether it takes part in the statistics; false for a pair that is no pair (another face was touched).</summary>
    public bool Counts { get; init; } = true;
}
