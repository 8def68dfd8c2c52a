using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Sets;

/// <summary>Settings of the stage sets.</summary>
public sealed record SetSettings : IStageSettings
{
    /// <summary>How planes are weighted: count (every plane alike, less where its own attitude is uncertain), exposure (the same,
    /// more where the surface shows planes of that attitude rarely) or area (by exposed area). Count and exposure ask how often an
    /// attitude occurs, on the surface and in the rock; area asks how much rock surface has it.</summary>
    public SetWeighting Weighting { get; init; } = SetWeighting.Exposure;

    /// <summary>Most sets looked for in one domain.</summary>
    public int MostSets { get; init; } = 8;

    /// <summary>Fewest separate planes that make a set. Faces that lie on one plane count once.</summary>
    public int FewestPlanes { get; init; } = 6;

    /// <summary>Two clusters of poles are one set when the density between them never falls below this part of the lower
    /// summit. Near 1 every dent parts two sets, near 0 only an empty gap does.</summary>
    public double ValleyDepth { get; init; } = 0.6;

    /// <summary>A cluster whose poles scatter by more than this (one standard deviation, in its widest direction) is no set [deg].</summary>
    public double WidestDeg { get; init; } = 20;

    /// <summary>Faces farther apart than this are never taken for pieces of one plane [m]. Empty: six times the square root of
    /// the larger face's area, at least 5 m.</summary>
    public double? ReachM { get; init; }

    /// <summary>Breadth of the lines along a set's normal on which its planes are counted for spacing [m]. Empty: four times the
    /// spacing of the points.</summary>
    public double? LaneM { get; init; }

    /// <inheritdoc/>
    public IEnumerable<SettingComplaint> Check()
    {
        if (!Enum.IsDefined(Weighting)) yield return new("sets.weighting", Invariant($"{(int)Weighting}"), "must be count, exposure or area");
        if (MostSets is < 1 or > 20) yield return new("sets.most_sets", Invariant($"{MostSets}"), "must be 1 to 20");
        if (FewestPlanes < 3) yield return new("sets.fewest_planes", Invariant($"{FewestPlanes}"), "must be 3 or more");
        if (!(ValleyDepth > 0 && ValleyDepth <= 1)) yield return new("sets.valley_depth", Invariant($"{ValleyDepth}"), "must be above 0 and at most 1");
        if (!(WidestDeg >= 2 && WidestDeg <= 45)) yield return new("sets.widest_deg", Invariant($"{WidestDeg}"), "must be 2 to 45");
        if (ReachM is { } reach && !(reach > 0)) yield return new("sets.reach_m", Invariant($"{reach}"), "must be above 0, or empty");
        if (LaneM is { } lane && !(lane > 0)) yield return new("sets.lane_m", Invariant($"{lane}"), "must be above 0, or empty");
    }
}
