using SkiaSharp;

namespace CloudStruct.Products.Plots;

/// <summary>How one set looks on a plot.</summary>
/// <param name="Colour">Colour.</param>
/// <param name="Shape">Shape of its marks.</param>
/// <param name="Hollow">Whether marks are drawn as outlines.</param>
/// <param name="Dashes">Lengths of dashes and gaps of its lines [pt]; empty for a full line.</param>
internal sealed record GroupStyle(SKColor Colour, MarkShape Shape, bool Hollow, float[] Dashes);
