using SkiaSharp;

namespace CloudStruct.Products.Plots;

internal sealed partial class Pen
{
    /// <summary>One line of text.</summary>
    /// <param name="text">Text.</param>
    /// <param name="x">Left edge, middle or right edge, as <paramref name="align"/> says.</param>
    /// <param name="baseline">Base line.</param>
    /// <param name="letters">Size and cut.</param>
    /// <param name="colour">Colour.</param>
    /// <param name="align">Where the text lies from x.</param>
    /// <param name="upright">True for text that reads upward along the sheet's edge.</param>
    public void Text(string text, float x, float baseline, Letters letters, SKColor colour, Align align = Align.Left, bool upright = false)
    {
        using SKFont font = letters.Font();
        using var paint = new SKPaint { Color = colour, IsAntialias = true };
        float width = font.MeasureText(text), from = align switch { Align.Middle => -width / 2, Align.Right => -width, _ => 0 };
        canvas.Save();
        canvas.Translate(x, baseline);
        if (upright) canvas.RotateDegrees(-90);
        if (outlines)
        {
            using SKPath path = font.GetTextPath(text, new SKPoint(from, 0));
            canvas.DrawPath(path, paint);
        }
        else
        {
            canvas.DrawText(text, from, 0, SKTextAlign.Left, font, paint);
        }
        canvas.Restore();
    }

    /// <summary>One line of text on a picture: white around the letters, as they are drawn over light and dark.</summary>
    public void TextOnPicture(string text, float x, float baseline, Letters letters, SKColor colour, Align align = Align.Left)
    {
        using SKFont font = letters.Font();
        float width = font.MeasureText(text), from = x + (align switch { Align.Middle => -width / 2, Align.Right => -width, _ => 0 });
        using (SKPath path = font.GetTextPath(text, new SKPoint(from, baseline)))
        using (SKPaint halo = Stroke(new SKColor(0xFF, 0xFF, 0xFF, 0xE6), 1.8f))
        {
            canvas.DrawPath(path, halo);
        }

        Text(text, x, baseline, letters, colour, align);
    }

    /// <summary>Lines of text one below the other.</summary>
    /// <returns>Base line of the line after the last.</returns>
    public float Lines(IEnumerable<string> lines, float x, float baseline, Letters letters, SKColor colour)
    {
        foreach (string line in lines)
        {
            Text(line, x, baseline, letters, colour);
            baseline += letters.Lead;
        }
        return baseline;
    }
}
