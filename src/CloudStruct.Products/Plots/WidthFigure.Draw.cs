using CloudStruct.Records.Drawings;
using CloudStruct.Records.Width;
using SkiaSharp;

namespace CloudStruct.Products.Plots;

internal static partial class WidthFigure
{
    /// <summary>Above so many stations the line alone is drawn: dots would cover it.</summary>
    private const int ManyStations = 90;

    /// <summary>Least distance of marks along the sheet [pt].</summary>
    private const float MarkDistance = 5;

    private static void Axes(Pen pen, Frame f, float lanesBottom, float tickBaseline)
    {
        foreach (double tick in f.Across.Ticks())
        {
            float y = f.Y(tick);
            pen.Line(f.Left, y, f.Right, y, Palette.Hair, 0.35f);
            pen.Line(f.Left - 3, y, f.Left, y, Palette.Ink, 0.6f);
            pen.Text(f.Across.Label(tick), f.Left - 5, y + (Letters.Axis.Size * 0.36f), Letters.Axis, Palette.Ink, Align.Right);
        }
        pen.Line(f.Left, f.Top, f.Left, f.Bottom, Palette.Ink, 0.6f);
        pen.Line(f.Left, f.Bottom, f.Right, f.Bottom, Palette.Ink, 0.6f);
        foreach (double tick in f.Along.Ticks())
        {
            float x = f.X(tick);
            pen.Line(x, lanesBottom, x, lanesBottom + 3, Palette.Ink, 0.6f);
            pen.Text(f.Along.Label(tick), x, tickBaseline, Letters.Axis, Palette.Ink, Align.Middle);
        }
    }

    private static void Hidden(Pen pen, Frame f, Stretch s)
    {
        if (s.Status is StationStatus.Measured or StationStatus.Unconstrained) return;
        float left = f.X(s.FromM), right = f.X(s.ToM);
        pen.Box(left, f.Top, right, f.Bottom, new SKColor(0xF2, 0xF2, 0xF2));
        pen.Hatch(left, f.Top, right, f.Bottom, s.Status == StationStatus.BothHidden ? 3.5f : 7, Palette.Hair, 0.5f);
    }

    private static void Curve(Pen pen, Frame f, Stretch s)
    {
        if (s.Status == StationStatus.Measured)
        {
            Band(pen, f, s.Points);
            WidthPoint[] known = [.. s.Points.Where(p => p.WidthM != null)];
            pen.Line([.. known.Select(p => f.At(p.ChainageM, p.WidthM!.Value))], Palette.Measured, 1.1f);
            bool dots = s.OfTotal <= ManyStations || known.Length == 1;
            foreach (WidthPoint p in known)
            {
                if (dots) pen.Mark(new(Palette.Measured, MarkShape.Circle, false, []), f.X(p.ChainageM), f.Y(p.WidthM!.Value), 2.6f);
            }
            return;
        }
        var plain = new GroupStyle(Palette.Ink, MarkShape.Circle, true, []);
        if (s.Status == StationStatus.Unconstrained) Sparse(pen, f, s, p => p.ApparentM, true, (x, y) => pen.Mark(plain, x, y, 3.4f));
        else Sparse(pen, f, s, p => p.VisibleM, false, (x, y) => AtLeast(pen, x, y));
    }

    // Marks only as close as they can be told apart; widths, not lower bounds, are joined by a thin line.
    private static void Sparse(Pen pen, Frame f, Stretch s, Func<WidthPoint, double?> value, bool joined, Action<float, float> mark)
    {
        SKPoint[] places = [.. s.Points.Where(p => value(p) is { } v && double.IsFinite(v)).Select(p => f.At(p.ChainageM, value(p)!.Value))];
        if (joined) pen.Line(places, Palette.Ink, 0.4f);
        float last = float.NegativeInfinity;
        foreach (SKPoint p in places)
        {
            if (p.X - last < MarkDistance) continue;
            mark(p.X, p.Y);
            last = p.X;
        }
    }

    // One station alone has no band to fill: a bar with caps says the same.
    private static void Band(Pen pen, Frame f, WidthPoint[] points)
    {
        var colour = new SKColor(0xA6, 0xCB, 0xE3);
        WidthPoint[] known = [.. points.Where(p => p is { Low95M: not null, High95M: not null })];
        if (known.Length == 1)
        {
            float x = f.X(known[0].ChainageM), low = f.Y(known[0].Low95M!.Value), high = f.Y(known[0].High95M!.Value);
            pen.Line(x, low, x, high, Palette.Measured, 0.8f);
            pen.Line(x - 1.5f, low, x + 1.5f, low, Palette.Measured, 0.8f);
            pen.Line(x - 1.5f, high, x + 1.5f, high, Palette.Measured, 0.8f);
            return;
        }
        pen.Fill(
            [.. known.Select(p => f.At(p.ChainageM, p.High95M!.Value)), .. known.Reverse().Select(p => f.At(p.ChainageM, p.Low95M!.Value))], colour);
    }

    private static void AtLeast(Pen pen, float x, float y)
    {
        pen.Line(x - 1.8f, y, x + 1.8f, y, Palette.Ink, 0.8f);
        pen.Line(x, y, x, y - 4.5f, Palette.Ink, 0.6f);
        pen.Fill([new(x, y - 6.5f), new(x + 1.5f, y - 3.6f), new(x - 1.5f, y - 3.6f)], Palette.Ink);
    }

    private static void Lanes(Pen pen, Frame f, List<Stretch> stretches)
    {
        Lane(pen, f, stretches, "A", f.Bottom + LaneRoom, s => s is StationStatus.AHidden or StationStatus.BothHidden);
        Lane(pen, f, stretches, "B", f.Bottom + LaneRoom + LaneHeight + LaneGap, s => s is StationStatus.BHidden or StationStatus.BothHidden);
    }

    private static void Lane(Pen pen, Frame f, List<Stretch> stretches, string name, float top, Func<StationStatus, bool> hidden)
    {
        pen.Text(name, f.Left - 5, top + LaneHeight, Letters.Axis, Palette.Ink, Align.Right);
        // Neighbouring stretches that look alike are drawn as one: a seam would read as a change.
        for (int from = 0; from < stretches.Count;)
        {
            int to = from + 1;
            while (to < stretches.Count && hidden(stretches[to].Status) == hidden(stretches[from].Status)) to++;
            float left = f.X(stretches[from].FromM), right = f.X(stretches[to - 1].ToM);
            bool shows = !hidden(stretches[from].Status);
            pen.Box(left, top, right, top + LaneHeight, shows ? Palette.Quiet : SKColors.White);
            if (!shows) pen.Hatch(left, top, right, top + LaneHeight, 2.5f, Palette.Quiet, 0.6f);
            from = to;
        }
    }
}
