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

    /// <summary>Plain sentence beneath.</summary>
    public string Sentence { get; init; } = "";
}
