using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Contacts;

/// <summary>Settings of the stage contacts.</summary>
public sealed record ContactSettings : IStageSettings
{
    /// <summary>Length of the stretch over which one attitude is fitted, in widths of the dike. Longer is surer, shorter
    /// follows bends better.</summary>
    public double WindowWidths { get; init; } = 4;

    /// <summary>That stretch is never shorter than this [m]: a thin dike needs more than its own widths.</summary>
    public double WindowMinM { get; init; } = 5;

    /// <summary>Trace points are averaged over cells of this edge [m]; empty: 0.25 m, more for coarse clouds and wide dikes.</summary>
    public double? CellM { get; init; }

    /// <summary>A change of rock between two points farther apart than this many spacings of the cloud is taken for a jump of
    /// the view, not for a contact.</summary>
    public double OcclusionSpacings { get; init; } = 3;

    /// <summary>A dip is quoted only where the 95 % cone of the contact is not wider than this [deg].</summary>
    public double LargestConeDeg { get; init; } = 10;

    /// <summary>A dip is quoted only where the trace departs from a straight line by this many times its own error.</summary>
    public double ReliefFactor { get; init; } = 5;

    /// <summary>Error of the trace that averaging cannot take away [m]: blur of the colours, rounding of edges.</summary>
    public double EdgeErrorM { get; init; } = 0.015;

    /// <summary>Whether the colours on both sides shift each trace point to the place where the colour really changes.</summary>
    public bool RefineByColour { get; init; } = true;

    /// <summary>A face lies on a contact when it is this parallel to it [deg].</summary>
    public double SurfaceAngleDeg { get; init; } = 10;

    /// <summary>... and this close to it [m]; empty: twice the scatter of the trace, at least 0.04 m.</summary>
    public double? SurfaceToleranceM { get; init; }

    /// <summary>Error of a compass reading that takes part as prior, in each direction [deg]: the compass, and how far a hand-sized
    /// piece departs from the contact over a stretch.</summary>
    public double PriorSigmaDeg { get; init; } = 5;

    /// <inheritdoc/>
    public IEnumerable<SettingComplaint> Check()
    {
        if (!(WindowWidths is >= 1 and <= 50)) yield return new("contacts.window_widths", Invariant($"{WindowWidths}"), "must be 1 to 50");
        if (!(WindowMinM is > 0 and <= 1000)) yield return new("contacts.window_min_m", Invariant($"{WindowMinM}"), "must be above 0 and at most 1000");
        if (CellM is { } c && !(c is > 0 and <= 100)) yield return new("contacts.cell_m", Invariant($"{c}"), "must be above 0 and at most 100, or empty");
        if (!(OcclusionSpacings is >= 1 and <= 20)) yield return new("contacts.occlusion_spacings", Invariant($"{OcclusionSpacings}"), "must be 1 to 20");
        if (!(LargestConeDeg is > 0 and <= 45)) yield return new("contacts.largest_cone_deg", Invariant($"{LargestConeDeg}"), "must be above 0 and at most 45");
        if (!(ReliefFactor is > 0 and <= 100)) yield return new("contacts.relief_factor", Invariant($"{ReliefFactor}"), "must be above 0 and at most 100");
        if (!(EdgeErrorM is >= 0 and <= 1)) yield return new("contacts.edge_error_m", Invariant($"{EdgeErrorM}"), "must be 0 to 1");
        if (!(SurfaceAngleDeg is > 0 and <= 45)) yield return new("contacts.surface_angle_deg", Invariant($"{SurfaceAngleDeg}"), "must be above 0 and at most 45");
        if (!(PriorSigmaDeg is >= 0.5 and <= 30)) yield return new("contacts.prior_sigma_deg", Invariant($"{PriorSigmaDeg}"), "must be 0.5 to 30");
        if (SurfaceToleranceM is { } t && !(t is > 0 and <= 10)) yield return new("contacts.surface_tolerance_m", Invariant($"{t}"), "must be above 0 and at most 10, or empty");
    }
}
