namespace CloudStruct.Products.Plots;

/// <summary>A plot laid out: its size is known and it can be drawn on any canvas.</summary>
/// <param name="Name">File stem.</param>
/// <param name="Title">Title.</param>
/// <param name="Words">What it shows, for readers who cannot see it.</param>
/// <param name="WidthPt">Width [pt].</param>
/// <param name="HeightPt">Height [pt].</param>
/// <param name="Draw">Draws it.</param>
internal sealed record Figure(string Name, string Title, string Words, float WidthPt, float HeightPt, Action<Pen> Draw)
{
    /// <summary>Width of one column of a journal: 85 mm.</summary>
    public const float ColumnPt = 85 / 25.4f * 72;
}
