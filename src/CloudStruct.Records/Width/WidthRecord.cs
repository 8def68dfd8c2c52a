namespace CloudStruct.Records.Width;

/// <summary>What the stage width gives.</summary>
public sealed record WidthRecord
{
    /// <summary>Stations, dike after dike, in order of chainage.</summary>
    public Station[] Stations { get; init; } = [];

    /// <summary>One per dike.</summary>
    public DikeSummary[] Dikes { get; init; } = [];

    /// <summary>Steps and tapers, dike after dike.</summary>
    public WidthTrend[] Trends { get; init; } = [];

    /// <summary>Distance between stations [m].</summary>
    public double StationM { get; init; }
}
