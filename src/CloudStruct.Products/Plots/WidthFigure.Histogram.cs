using CloudStruct.Records.Drawings;
using CloudStruct.Records.Width;
using SkiaSharp;

namespace CloudStruct.Products.Plots;

internal static partial class WidthFigure
{
    private const float HistogramHeight = 62;

    // Counts as bars, the laws as the counts they expect; the law that fits best is drawn heavier.
    private static void Histogram(Pen pen, Frame f, WidthHistogram h)
    {
        foreach (double tick in f.Across.Ticks())
        {
            float y = f.Y(tick);
            pen.Line(f.Left, y, f.Right, y, Palette.Hair, 0.35f);
            pen.Line(f.Left - 3, y, f.Left, y, Palette.Ink, 0.6f);
            pen.Text(f.Across.Label(tick), f.Left - 5, y + (Letters.Axis.Size * 0.36f), Letters.Axis, Palette.Ink, Align.Right);
        }

        for (int i = 0; i < h.Counts.Length; i++)
        {
            if (h.Counts[i] == 0) continue;
            float left = f.X(h.FromM + (i * h.BinM)), right = f.X(h.FromM + ((i + 1) * h.BinM));
            pen.Box(left + 0.4f, f.Y(h.Counts[i]), right - 0.4f, f.Bottom, new SKColor(0xA6, 0xCB, 0xE3));
        }

        foreach (LawCurve law in h.Laws)
        {
            GroupStyle style = Palette.Group(1 + (int)law.Kind);
            pen.Line([.. law.Points.Where(p => p.Y <= f.Across.To).Select(p => f.At(p.X, p.Y))], style.Colour, law.Best ? 1.5f : 0.8f, style.Dashes);
        }

        pen.Line(f.Left, f.Top, f.Left, f.Bottom, Palette.Ink, 0.6f);
        pen.Line(f.Left, f.Bottom, f.Right, f.Bottom, Palette.Ink, 0.6f);
        foreach (double tick in f.Along.Ticks())
        {
            float x = f.X(tick);
            pen.Line(x, f.Bottom, x, f.Bottom + 3, Palette.Ink, 0.6f);
            pen.Text(f.Along.Label(tick), x, f.Bottom + 5 + Letters.Axis.Size, Letters.Axis, Palette.Ink, Align.Middle);
        }

        pen.Text("true width (m)", (f.Left + f.Right) / 2, f.Bottom + 5.5f + Letters.Axis.Size + Letters.Body.Lead, Letters.Body, Palette.Ink, Align.Middle);
        pen.Text("stations", Pad + Letters.Body.Size, (f.Top + f.Bottom) / 2, Letters.Body, Palette.Ink, Align.Middle, upright: true);
    }

    // One entry a law, with the line it is drawn with.
    private static void LawKey(Pen pen, LawCurve[] laws, float left, float baseline)
    {
        float x = left;
        foreach (LawCurve law in laws)
        {
            GroupStyle style = Palette.Group(1 + (int)law.Kind);
            string label = (law.Kind == ThicknessLawKind.Weibull ? "Weibull" : law.Kind.ToString().ToLowerInvariant()) + (law.Best ? " (fits best)" : "");
            pen.Line([new(x, baseline - 2.4f), new(x + 13, baseline - 2.4f)], style.Colour, law.Best ? 1.5f : 0.8f, style.Dashes);
            pen.Text(label, x + 16, baseline, Letters.Axis, Palette.Ink);
            x += 16 + Letters.Axis.Measure(label) + 9;
        }
    }
}
