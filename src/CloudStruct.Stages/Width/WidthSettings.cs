using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Width;

/// <summary>Settings of the stage width.</summary>
public sealed record WidthSettings : IStageSettings
{
    /// <summary>Distance between stations along the dike [m].</summary>
    public double StationM { get; init; } = 1;

    /// <summary>A margin counts as seen at a station when its trace comes this close along strike [m].</summary>
    public double SeenWithinM { get; init; } = 0.5;

    /// <summary>Error of each margin's place that averaging cannot take away [m]: blur of the colours, rounding of edges, a shift
    /// of the labels.</summary>
    public double EdgeErrorM { get; init; } = 0.015;

    /// <inheritdoc/>
    public IEnumerable<SettingComplaint> Check()
    {
        if (!(StationM is >= 0.05 and <= 1000)) yield return new("width.station_m", Invariant($"{StationM}"), "must be 0.05 to 1000");
        if (!(SeenWithinM is > 0 and <= 100)) yield return new("width.seen_within_m", Invariant($"{SeenWithinM}"), "must be above 0 and at most 100");
        if (!(EdgeErrorM is >= 0 and <= 1)) yield return new("width.edge_error_m", Invariant($"{EdgeErrorM}"), "must be 0 to 1");
    }
}
