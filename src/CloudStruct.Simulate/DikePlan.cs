using CloudStruct.Simulate.Chance;

namespace CloudStruct.Simulate;

/// <summary>One dike.</summary>
public sealed record DikePlan
{
    /// <summary>Strike against uphill [deg]; either sign of dip is drawn.</summary>
    public Span2 StrikeDeg { get; init; } = new(-25, 25);

    /// <summary>Dip [deg].</summary>
    public Span2 DipDeg { get; init; } = new(68, 90);

    /// <summary>True width [m].</summary>
    public Span2 WidthM { get; init; } = new(1.8, 3.6);

    /// <summary>Where it crosses the middle of the outcrop, as a share of the breadth.</summary>
    public Span2 Across { get; init; } = new(0.42, 0.58);

    /// <summary>Undulation that both margins share, one standard deviation [m].</summary>
    public Span2 WaveM { get; init; } = new(0.03, 0.07);

    /// <summary>Undulation of each margin by itself, one standard deviation [m].</summary>
    public Span2 OwnWaveM { get; init; } = new(0.01, 0.02);

    /// <summary>Change of strike from end to end [deg], to either side.</summary>
    public Span2 BendDeg { get; init; }

    /// <summary>Relative change of width from end to end, either way.</summary>
    public Span2 Taper { get; init; } = new(0, 0.08);

    /// <summary>Sudden relative change of width at one place, either way.</summary>
    public Span2 Jump { get; init; }

    /// <summary>Where it ends: distance from the middle toward one end of its strike as a share of the outcrop's length; null for a dike
    /// that crosses the whole outcrop.</summary>
    public Span2? TipAt { get; init; }

    /// <summary>Distance over which it narrows to its end, as half an ellipse does [m].</summary>
    public Span2 TipLengthM { get; init; } = new(4, 7);

    /// <summary>Mean distance of cooling joints [m].</summary>
    public Span2 JointSpacingM { get; init; } = new(0.35, 0.55);

    /// <summary>Fisher concentration of cooling joints.</summary>
    public Span2 JointKappa { get; init; } = new(80, 200);

    /// <summary>Jointed like the host instead.</summary>
    public bool HostJoints { get; init; }

    /// <summary>How far its surface stands above (or below) the host's [m].</summary>
    public Span2 ReliefM { get; init; } = new(-0.35, 0.1);

    /// <summary>Share of its volume taken by clasts of host rock.</summary>
    public Span2 InclusionShare { get; init; }

    /// <summary>Look of the dike.</summary>
    public RockLook Look { get; init; } = RockLook.Dolerite;
}
