using CloudStruct.Records.Drawings;
using SkiaSharp;
using static System.FormattableString;

namespace CloudStruct.Products.Plots;

/// <summary>Lays out a picture of the cloud at page width: title above, scale bar, north and sentence beneath.</summary>
internal static class ViewFigure
{
    /// <summary>Width of a page's text: 174 mm.</summary>
    private const float PagePt = 174 / 25.4f * 72;

    private const float Pad = 6, BarHeight = 4;

    /// <summary>Pixels per point at which the picture's own pixels are kept, but never coarser than 150 dpi for the text.</summary>
    public static float PerPoint(ViewImage view) => Math.Clamp(view.Width / (PagePt - (2 * Pad)), 150f / 72, 6);

    /// <summary>The figure of one view.</summary>
    /// <param name="view">Pixels.</param>
    /// <param name="hasNorth">False when angles are in the model's frame: no arrow.</param>
    /// <param name="runId">For the small print.</param>
    public static Figure Make(ViewImage view, bool hasNorth, string runId)
    {
        const float inner = PagePt - (2 * Pad);
        string[] title = Letters.Title.Wrap(view.Title, inner), sentence = Letters.Body.Wrap(view.Sentence, inner);
        float scale = inner / view.Width, height = view.Height * scale;
        float top = Pad + (title.Length * Letters.Title.Lead) + 2, bottom = top + height, barTop = bottom + 8;
        float sentenceTop = barTop + BarHeight + (2 * Letters.Body.Lead) + 12, runTop = sentenceTop + (sentence.Length * Letters.Body.Lead) + 1;
        double barM = NiceScale.StepFor(view.Width * view.PixelM / 8);
        float bar = (float)(barM / view.PixelM) * scale;
        return new(view.Name, view.Title, view.Sentence, PagePt, runTop + Pad, pen =>
        {
            pen.Lines(title, Pad, Pad + 8, Letters.Title, Palette.Ink);
            using (SKImage image = ImageOf(view)) pen.Picture(image, new SKRect(Pad, top, Pad + inner, bottom));
            pen.Line([new(Pad, top), new(Pad + inner, top), new(Pad + inner, bottom), new(Pad, bottom), new(Pad, top)], Palette.Hair, 0.5f);
            Bar(pen, Pad, barTop, bar, barM);
            if (hasNorth && view.UpAzimuthDeg is { } up) Arrow(pen, PagePt - Pad - 16, barTop + 13, up);
            Key(pen, view.Key, Pad + Math.Max(bar, 60) + 40, barTop);
            pen.Lines(sentence, Pad, sentenceTop, Letters.Body, Palette.Ink);
            pen.Text("run " + runId, Pad, runTop, Letters.Small, Palette.Quiet);
        });
    }

    internal static void Bar(Pen pen, float left, float top, float length, double lengthM)
    {
        pen.Box(left, top, left + (length / 2), top + BarHeight, Palette.Ink);
        pen.Line([new(left, top), new(left + length, top), new(left + length, top + BarHeight), new(left, top + BarHeight), new(left, top)], Palette.Ink, 0.6f);
        float baseline = top + BarHeight + Letters.Body.Lead;
        pen.Text("0", left, baseline, Letters.Body, Palette.Ink);
        pen.Text(Invariant($"{lengthM:0.###} m"), left + length, baseline, Letters.Body, Palette.Ink, Align.Middle);
    }

    // Swatches beside the scale bar, as many lines as they need, clear of the arrow.
    private static void Key(Pen pen, ViewKey[] key, float left, float top)
    {
        const float swatch = 9;
        float x = left, y = top;
        foreach (ViewKey entry in key)
        {
            float width = swatch + 4 + Letters.Body.Measure(entry.Label) + 12;
            if (x + width > PagePt - Pad - 36 && x > left) (x, y) = (left, y + Letters.Body.Lead + 2);
            pen.Box(x, y - 1.5f, x + swatch, y + 5.5f, new SKColor(entry.Red, entry.Green, entry.Blue));
            pen.Line([new(x, y - 1.5f), new(x + swatch, y - 1.5f), new(x + swatch, y + 5.5f), new(x, y + 5.5f), new(x, y - 1.5f)], Palette.Hair, 0.4f);
            pen.Text(entry.Label, x + swatch + 4, y + 4.6f, Letters.Body, Palette.Ink);
            x += width;
        }
    }

    internal static void Arrow(Pen pen, float x, float y, double upAzimuthDeg)
    {
        (float sin, float cos) = MathF.SinCos(-(float)upAzimuthDeg * MathF.PI / 180);
        SKPoint Turned(float right, float forward) => new(x + (right * cos) + (forward * sin), y + (right * sin) - (forward * cos));
        pen.Fill([Turned(0, 8), Turned(4, -6), Turned(0, -3), Turned(-4, -6)], Palette.Ink);
        SKPoint letter = Turned(0, 12.5f);
        pen.Text("N", letter.X, letter.Y + 2.4f, Letters.Body, Palette.Ink, Align.Middle);
    }

    private static SKImage ImageOf(ViewImage view)
    {
        var info = new SKImageInfo(view.Width, view.Height, SKColorType.Rgba8888, SKAlphaType.Unpremul);
        return SKImage.FromPixelCopy(info, view.Rgba);
    }
}
