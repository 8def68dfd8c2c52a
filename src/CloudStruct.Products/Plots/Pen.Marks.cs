using SkiaSharp;

namespace CloudStruct.Products.Plots;

internal sealed partial class Pen
{
    /// <summary>A mark of a set.</summary>
    /// <param name="style">Colour and shape.</param>
    /// <param name="x">Middle.</param>
    /// <param name="y">Middle.</param>
    /// <param name="size">Diameter of the circle; other shapes have about its area.</param>
    public void Mark(GroupStyle style, float x, float y, float size)
    {
        float edge = MathF.Min(0.5f, size * 0.15f);
        if (style.Shape == MarkShape.Circle)
        {
            var box = new SKRect(x - (size / 2), y - (size / 2), x + (size / 2), y + (size / 2));
            using var fill = new SKPaint { Color = style.Hollow ? SKColors.White : style.Colour, IsAntialias = true };
            canvas.DrawOval(box, fill);
            using SKPaint line = Stroke(style.Hollow ? style.Colour : SKColors.White, style.Hollow ? edge * 1.6f : edge);
            canvas.DrawOval(box, line);
            return;
        }
        SKPoint[] corners = Corners(style.Shape);
        for (int i = 0; i < corners.Length; i++) corners[i] = new(x + (corners[i].X * size), y + (corners[i].Y * size));
        Fill(corners, style.Hollow ? SKColors.White : style.Colour);
        Line([.. corners, corners[0]], style.Hollow ? style.Colour : SKColors.White, style.Hollow ? edge * 1.6f : edge);
    }

    /// <summary>A small filled disc.</summary>
    public void Dot(SKPoint at, float radius, SKColor colour)
    {
        using var fill = new SKPaint { Color = colour, IsAntialias = true };
        canvas.DrawCircle(at, radius, fill);
    }

    // Corners about the middle for a circle of diameter 1, sized to look as heavy as it.
    private static SKPoint[] Corners(MarkShape shape) => shape switch
    {
        MarkShape.Square => [new(-0.44f, -0.44f), new(0.44f, -0.44f), new(0.44f, 0.44f), new(-0.44f, 0.44f)],
        MarkShape.TriangleUp => [new(0, -0.66f), new(0.6f, 0.4f), new(-0.6f, 0.4f)],
        MarkShape.TriangleDown => [new(0, 0.66f), new(-0.6f, -0.4f), new(0.6f, -0.4f)],
        MarkShape.Diamond => [new(0, -0.64f), new(0.5f, 0), new(0, 0.64f), new(-0.5f, 0)],
        MarkShape.Hexagon => [new(-0.54f, 0), new(-0.27f, -0.47f), new(0.27f, -0.47f), new(0.54f, 0), new(0.27f, 0.47f), new(-0.27f, 0.47f)],
        _ => [new(-0.17f, -0.6f), new(0.17f, -0.6f), new(0.17f, -0.17f), new(0.6f, -0.17f), new(0.6f, 0.17f), new(0.17f, 0.17f),
              new(0.17f, 0.6f), new(-0.17f, 0.6f), new(-0.17f, 0.17f), new(-0.6f, 0.17f), new(-0.6f, -0.17f), new(-0.17f, -0.17f)],
    };
}
