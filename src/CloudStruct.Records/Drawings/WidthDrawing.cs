using CloudStruct.Records.Width;

namespace CloudStruct.Records.Drawings;

/// <summary>The width of one dike along strike.</summary>
public sealed record WidthDrawing
{
    /// <summary>Number of the dike.</summary>
    public int Dike { get; init; }

    /// <summary>Title.</summary>
    public string Title { get; init; } = "";

    /// <summary>Stations in order of chainage.</summary>
    public WidthPoint[] Points { get; init; } = [];

    /// <summary>Steps and tapers.</summary>
    public WidthTrend[] Trends { get; init; } = [];

    /// <summary>Lean of the margins, stretch by stretch.</summary>
    public MarginLean[] Leans { get; init; } = [];

    /// <summary>Widths in bins with the laws fitted; null with too few stations.</summary>
    public WidthHistogram? Histogram { get; init; }

    /// <summary>Plain sentence beneath.</summary>
    public string Sentence { get; init; } = "";
}
