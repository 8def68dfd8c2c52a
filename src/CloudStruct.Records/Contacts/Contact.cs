using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Contacts;

/// <summary>One row of contacts.csv: a contact over a stretch of chainage.</summary>
public sealed record Contact
{
    /// <summary>Number of the dike.</summary>
    public int Dike { get; init; }

    /// <summary>Side.</summary>
    public Margin Margin { get; init; }

    /// <summary>1, 2, ... along the margin.</summary>
    public int Segment { get; init; }

    /// <summary>Start of the stretch [m].</summary>
    public double ChainageFromM { get; init; }

    /// <summary>End of the stretch [m].</summary>
    public double ChainageToM { get; init; }

    /// <summary>Middle of the evidence, local [m].</summary>
    public Vec3 Middle { get; init; }

    /// <summary>Plane or line.</summary>
    public Constraint Constraint { get; init; }

    /// <summary>Upward unit normal, grid frame; null for a line.</summary>
    public Vec3? Normal { get; init; }

    /// <summary>Strike and dip about the stated north; null for a line.</summary>
    public Attitude? Attitude { get; init; }

    /// <summary>Region of the pole; null for a line.</summary>
    public PoleRegion? Region { get; init; }

    /// <summary>How far the evidence departs from a straight line: root of the second eigenvalue of its scatter [m].</summary>
    public double ReliefM { get; init; }

    /// <summary>Rms distance of the evidence from the plane, or from the line [m].</summary>
    public double RmsM { get; init; }

    /// <summary>Trace points or surface points used.</summary>
    public int Points { get; init; }

    /// <summary>Continuous with chainage [deg]; null for a line.</summary>
    public double? TrendAlongDeg { get; init; }

    /// <summary>Tilt from vertical, positive when the top leans toward B [deg]; null for a line.</summary>
    public double? LeanToBDeg { get; init; }

    /// <summary>95 % limits of the lean [deg].</summary>
    public double? LeanLow95Deg { get; init; }

    /// <summary>95 % limits of the lean [deg].</summary>
    public double? LeanHigh95Deg { get; init; }

    /// <summary>Trend of the trace, about the stated north [deg].</summary>
    public double LineTrendDeg { get; init; }

    /// <summary>Plunge of the trace [deg].</summary>
    public double LinePlungeDeg { get; init; }

    /// <summary>What it rests on.</summary>
    public Evidence Evidence { get; init; }

    /// <summary>Compass point that the side faces, away from the dike: N, NE, ...</summary>
    public string MarginFacing { get; init; } = "";

    /// <summary>Length of the window along strike [m].</summary>
    public double WindowM { get; init; }

    /// <summary>"confirmed" and "note" where a geologist said so; empty otherwise.</summary>
    public string Decided { get; init; } = "";
}
