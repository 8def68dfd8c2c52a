namespace CloudStruct.Records.Classes;

/// <summary>All hand labels of a survey, in survey coordinates.</summary>
public sealed record HandLabels
{
    /// <summary>No labels.</summary>
    public static HandLabels None { get; } = new();

    /// <summary>Labelled places.</summary>
    public LabelPoint[] Points { get; init; } = [];

    /// <summary>Labelled areas.</summary>
    public LabelPolygon[] Polygons { get; init; } = [];

    /// <summary>True when nothing was labelled.</summary>
    public bool IsEmpty => Points.Length == 0 && Polygons.Length == 0;
}
