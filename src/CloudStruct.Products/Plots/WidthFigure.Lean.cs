using CloudStruct.Records.Contacts;
using CloudStruct.Records.Drawings;
using SkiaSharp;

namespace CloudStruct.Products.Plots;

internal static partial class WidthFigure
{
    private static readonly SKColor OfA = new(0x9C, 0x3F, 0x00), OfB = new(0x00, 0x6B, 0x4E);

    // The lean of each margin over its stretches: a line in its 95 % limits, nothing where only a line is known.
    private static void Leans(Pen pen, Frame f, MarginLean[] leans)
    {
        foreach (double tick in f.Across.Ticks())
        {
            float y = f.Y(tick);
            pen.Line(f.Left, y, f.Right, y, Palette.Hair, tick == 0 ? 0.8f : 0.35f);
            pen.Line(f.Left - 3, y, f.Left, y, Palette.Ink, 0.6f);
            pen.Text(f.Across.Label(tick), f.Left - 5, y + (Letters.Axis.Size * 0.36f), Letters.Axis, Palette.Ink, Align.Right);
        }

        foreach (MarginLean lean in leans)
        {
            if (lean is not { LeanDeg: { } middle, Low95Deg: { } low, High95Deg: { } high }) continue;
            float left = f.X(Math.Max(lean.FromM, f.Along.From)), right = f.X(Math.Min(lean.ToM, f.Along.To));
            SKColor colour = lean.Margin == Margin.A ? OfA : OfB;
            pen.Box(left, f.Y(Math.Min(high, f.Across.To)), right, f.Y(Math.Max(low, f.Across.From)), colour.WithAlpha(0x40));
            pen.Line([new(left, f.Y(middle)), new(right, f.Y(middle))], colour, 1.2f, lean.Margin == Margin.A ? null : [3, 1.5f]);
        }

        pen.Line(f.Left, f.Top, f.Left, f.Bottom, Palette.Ink, 0.6f);
        pen.Line(f.Left, f.Bottom, f.Right, f.Bottom, Palette.Ink, 0.6f);
        pen.Text("lean (deg)", Pad + Letters.Body.Size, (f.Top + f.Bottom) / 2, Letters.Body, Palette.Ink, Align.Middle, upright: true);
    }

    private static NiceScale ScaleOfLeans(MarginLean[] leans)
    {
        double[] shown = [0, .. leans.SelectMany(l => (double?[])[l.LeanDeg, l.Low95Deg, l.High95Deg]).Where(v => v is { } x && double.IsFinite(x)).Select(v => v!.Value)];
        double low = Math.Max(-90, shown.Min()), high = Math.Min(90, shown.Max());
        if (high - low < 4) (low, high) = (low - 2, high + 2);
        return NiceScale.Over(low, high, 4, true);
    }

    // Steps stand where they are most likely, with the limits of their place; tapers are the line between their ends.
    private static void Trends(Pen pen, Frame f, Records.Width.WidthTrend[] trends)
    {
        foreach (Records.Width.WidthTrend t in trends)
        {
            if (t.Kind == Records.Width.WidthTrendKind.Taper)
            {
                pen.Line([f.At(t.ChainageM.Low95, t.WidthBeforeM), f.At(t.ChainageM.High95, t.WidthAfterM)], Palette.Group(1).Colour, 1.1f, [5, 2]);
                continue;
            }

            float x = f.X(t.ChainageM.Value), left = f.X(Math.Max(f.Along.From, t.ChainageM.Low95)), right = f.X(Math.Min(f.Along.To, t.ChainageM.High95));
            pen.Box(left, f.Top, right, f.Bottom, new SKColor(0xD5, 0x5E, 0x00, 0x28));
            pen.Line([new(x, f.Top), new(x, f.Bottom)], Palette.Group(1).Colour, 0.9f, [2, 2]);
            string label = string.Create(System.Globalization.CultureInfo.InvariantCulture, $"{t.SizeM.Value:+0.00;-0.00} m");
            bool room = x + 3 + Letters.Axis.Measure(label) < f.Right;
            pen.TextOnPicture(label, room ? x + 3 : x - 3, f.Top + Letters.Axis.Size + 1, Letters.Axis, Palette.Group(1).Colour, room ? Align.Left : Align.Right);
        }
    }
}
