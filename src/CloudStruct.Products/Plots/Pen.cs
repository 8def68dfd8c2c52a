using SkiaSharp;

namespace CloudStruct.Products.Plots;

/// <summary>Draws on a canvas in points (1/72 inch), y down. The same calls make SVG, PDF and PNG.</summary>
/// <param name="canvas">Where to draw.</param>
/// <param name="outlines">Whether text is drawn as outlines. SVG carries no typeface, and a named one would be replaced
/// by whatever the reader's machine has: widths change, labels overlap. So SVG gets outlines, PDF and PNG get text.</param>
internal sealed partial class Pen(SKCanvas canvas, bool outlines)
{
    /// <summary>A line through points.</summary>
    public void Line(ReadOnlySpan<SKPoint> points, SKColor colour, float width, float[]? dashes = null)
    {
        if (points.Length < 2) return;
        using SKPaint paint = Stroke(colour, width);
        using SKPathEffect? dash = dashes is { Length: > 0 } ? SKPathEffect.CreateDash(dashes, 0) : null;
        paint.PathEffect = dash;
        using SKPath path = Path(points, false);
        canvas.DrawPath(path, paint);
    }

    /// <summary>A line between two places.</summary>
    public void Line(float x1, float y1, float x2, float y2, SKColor colour, float width) =>
        Line([new(x1, y1), new(x2, y2)], colour, width);

    /// <summary>A filled shape.</summary>
    public void Fill(ReadOnlySpan<SKPoint> points, SKColor colour)
    {
        if (points.Length < 3) return;
        using var paint = new SKPaint { Color = colour, IsAntialias = true };
        using SKPath path = Path(points, true);
        canvas.DrawPath(path, paint);
    }

    /// <summary>A filled rectangle.</summary>
    public void Box(float left, float top, float right, float bottom, SKColor colour) =>
        Fill([new(left, top), new(right, top), new(right, bottom), new(left, bottom)], colour);

    /// <summary>A circle's outline.</summary>
    public void Ring(float x, float y, float radius, SKColor colour, float width)
    {
        using SKPaint paint = Stroke(colour, width);
        canvas.DrawOval(new SKRect(x - radius, y - radius, x + radius, y + radius), paint);
    }

    /// <summary>A rectangle hatched by 45-degree lines, cut at its edges by arithmetic: clip paths are read differently
    /// by different programs.</summary>
    public void Hatch(float left, float top, float right, float bottom, float step, SKColor colour, float width)
    {
        // Lines x + y = c: counted from the sheet's corner, so that neighbouring boxes join.
        float first = MathF.Ceiling((left + top) / step) * step;
        for (float c = first; c <= right + bottom; c += step)
        {
            float x1 = MathF.Max(left, c - bottom), x2 = MathF.Min(right, c - top);
            if (x2 > x1) Line(x1, c - x1, x2, c - x2, colour, width);
        }
    }

    /// <summary>A picture.</summary>
    /// <remarks>Averaged from smaller copies only where it shrinks to less than half: making those copies took longer than
    /// drawing, and at the size of the picture itself nothing of them shows.</remarks>
    public void Picture(SKImage image, SKRect at)
    {
        float scale = at.Width * canvas.TotalMatrix.ScaleX / image.Width;
        canvas.DrawImage(image, at, new SKSamplingOptions(SKFilterMode.Linear, scale < 0.5f ? SKMipmapMode.Linear : SKMipmapMode.None), null);
    }

    private static SKPaint Stroke(SKColor colour, float width) => new()
    {
        Color = colour,
        IsAntialias = true,
        IsStroke = true,
        StrokeWidth = width,
        StrokeJoin = SKStrokeJoin.Round,
    };

    private static SKPath Path(ReadOnlySpan<SKPoint> points, bool close)
    {
        using var builder = new SKPathBuilder();
        builder.MoveTo(points[0]);
        for (int i = 1; i < points.Length; i++) builder.LineTo(points[i]);
        if (close || points[0] == points[^1]) builder.Close();
        return builder.Detach();
    }
}
