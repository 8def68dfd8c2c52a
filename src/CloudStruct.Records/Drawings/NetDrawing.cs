namespace CloudStruct.Records.Drawings;

/// <summary>An equal-area lower-hemisphere net with all that is drawn on it, computed.</summary>
public sealed record NetDrawing
{
    /// <summary>File stem: "net-host".</summary>
    public string Name { get; init; } = "";

    /// <summary>Title above the net.</summary>
    public string Title { get; init; } = "";

    /// <summary>Poles.</summary>
    public NetPole[] Poles { get; init; } = [];

    /// <summary>Great circles, cones, contours.</summary>
    public NetCurve[] Curves { get; init; } = [];

    /// <summary>Groups in order, for colours and the key.</summary>
    public string[] Groups { get; init; } = [];

    /// <summary>The statistics in plain sentences: count, weighting, north, contour method and levels.</summary>
    public string Sentence { get; init; } = "";

    /// <summary>False when angles are in the model's frame: no north arrow.</summary>
    public bool HasNorth { get; init; } = true;
}
