using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Thin;

/// <summary>How the cloud is brought to an even spacing.</summary>
public sealed record ThinSettings : IStageSettings
{
    /// <summary>Distance between neighbouring points of the working cloud [m]. Finer shows smaller faces and costs time
    /// and memory with its square. Default: the spacing of the input, but not below 1 cm and not so fine that more than
    /// max_points would be kept.</summary>
    public double? SpacingM { get; init; }

    /// <summary>Most points of the working cloud that the automatic spacing aims at; each takes about 150 bytes.</summary>
    public int MaxPoints { get; init; } = 25_000_000;

    /// <summary>Whether to drop stray points: single points with hardly a neighbour, points that float off the surface,
    /// and small clusters far from anything.</summary>
    public bool DropStray { get; init; } = true;

    /// <summary>A cluster of fewer points than this, with nothing else near, is stray. In a small cloud never more than a
    /// hundredth of its points.</summary>
    public int StrayClusterPoints { get; init; } = 50;

    /// <inheritdoc/>
    public IEnumerable<SettingComplaint> Check()
    {
        if (SpacingM is { } s && !(s > 0 && s <= 10)) yield return new("thin.spacing_m", Invariant($"{s}"), "must be above 0 and at most 10");
        if (MaxPoints is < 1000 or > 100_000_000) yield return new("thin.max_points", Invariant($"{MaxPoints}"), "must lie between 1000 and 100000000");
        if (StrayClusterPoints is < 0 or > 100_000) yield return new("thin.stray_cluster_points", Invariant($"{StrayClusterPoints}"), "must lie between 0 and 100000");
    }
}
