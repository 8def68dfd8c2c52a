using CloudStruct.Records.Drawings;
using CloudStruct.Records.Width;
using SkiaSharp;

namespace CloudStruct.Products.Plots;

/// <summary>Lays out the width of a dike along strike: the curve with its 95 % band, what is hidden drawn as hidden.</summary>
internal static partial class WidthFigure
{
    private const float Pad = 6, PlotHeight = 118, LaneHeight = 5, LaneGap = 2.5f, LaneRoom = 5, LeanHeight = 44, LeanRoom = 8;

    /// <summary>The figure of one dike.</summary>
    /// <param name="drawing">Stations.</param>
    /// <param name="direction">Which way chainage increases: "toward 047 deg (NE)".</param>
    /// <param name="runId">For the small print.</param>
    /// <param name="name">File stem.</param>
    public static Figure Make(WidthDrawing drawing, string direction, string runId, string name)
    {
        const float width = Figure.ColumnPt, inner = width - (2 * Pad);
        var stretches = Stretch.Of(drawing.Points);
        NiceScale across = ScaleOfWidths(drawing.Points);
        NiceScale along = stretches.Count == 0 ? NiceScale.Over(0, 1, 6, false)
            : NiceScale.Over(stretches[0].FromM, stretches[^1].ToM, 7, false);
        bool hasLeans = drawing.Leans.Any(l => l.LeanDeg is not null);
        NiceScale leans = ScaleOfLeans(drawing.Leans);
        float label = across.Ticks().Max(t => Letters.Axis.Measure(across.Label(t)));
        if (hasLeans) label = Math.Max(label, leans.Ticks().Max(t => Letters.Axis.Measure(leans.Label(t))));
        string[] title = Letters.Title.Wrap(drawing.Title, inner), sentence = Letters.Body.Wrap(drawing.Sentence, inner);
        string[] legend = Letters.Body.Wrap(Legend(drawing, across), inner);
        float left = Pad + Letters.Body.Lead + label + 5, right = width - Pad - 5;
        float top = Pad + (title.Length * Letters.Title.Lead) + 4, bottom = top + PlotHeight;
        float lanesBottom = bottom + LaneRoom + (2 * LaneHeight) + LaneGap, leanTop = lanesBottom + LeanRoom;
        float axisAt = hasLeans ? leanTop + LeanHeight : lanesBottom, tickBaseline = axisAt + 5 + Letters.Axis.Size;
        float axisBaseline = tickBaseline + Letters.Body.Lead + 0.5f, barsTop = axisBaseline + 13, barsBottom = barsTop + HistogramHeight;
        float lawBaseline = barsBottom + 9 + Letters.Axis.Size + (2 * Letters.Body.Lead);
        float legendTop = (drawing.Histogram is null ? axisBaseline : drawing.Histogram.Laws.Length > 0 ? lawBaseline : lawBaseline - Letters.Body.Lead) + Letters.Body.Lead + 3;
        float sentenceTop = legendTop + (legend.Length * Letters.Body.Lead) + (legend.Length > 0 ? 2 : 0);
        float runTop = sentenceTop + (sentence.Length * Letters.Body.Lead) + 1;
        var frame = new Frame(left, top, right, bottom, along, across);
        return new(name, drawing.Title, drawing.Sentence, width, runTop + Pad, pen =>
        {
            pen.Lines(title, Pad, Pad + 8, Letters.Title, Palette.Ink);
            foreach (Stretch s in stretches) Hidden(pen, frame, s);
            Axes(pen, frame, axisAt, tickBaseline);
            foreach (Stretch s in stretches) Curve(pen, frame, s);
            Trends(pen, frame, drawing.Trends);
            Lanes(pen, frame, stretches);
            pen.Text("true width (m)", Pad + Letters.Body.Size, (top + bottom) / 2, Letters.Body, Palette.Ink, Align.Middle, upright: true);
            pen.Text("chainage (m), increasing " + direction, (left + right) / 2, axisBaseline, Letters.Body, Palette.Ink, Align.Middle);
            if (hasLeans) Leans(pen, new Frame(left, leanTop, right, leanTop + LeanHeight, along, leans), drawing.Leans);
            if (drawing.Histogram is { } h)
            {
                var widths = NiceScale.Over(h.FromM, h.FromM + (h.Counts.Length * h.BinM), 6, false);
                double highest = Math.Max(h.Counts.Max(), h.Laws.Where(l => l.Best).SelectMany(l => l.Points).Select(p => p.Y).DefaultIfEmpty(0).Max());
                Histogram(pen, new Frame(left, barsTop, right, barsBottom, widths, NiceScale.Over(0, highest, 4, true)), h);
                LawKey(pen, h.Laws, left, lawBaseline);
            }

            pen.Lines(legend, Pad, legendTop, Letters.Body, Palette.Ink);
            pen.Lines(sentence, Pad, sentenceTop, Letters.Body, Palette.Ink);
            pen.Text("run " + runId, Pad, runTop, Letters.Small, Palette.Quiet);
        });
    }

    // From zero, unless the widths keep so far from it that their changes would drown; the legend says so then.
    private static NiceScale ScaleOfWidths(WidthPoint[] points)
    {
        double[] shown = [.. points.SelectMany(p => (double?[])[p.Low95M, p.WidthM, p.High95M, p.ApparentM, p.VisibleM])
            .Where(v => v is { } x && double.IsFinite(x)).Select(v => v!.Value)];
        if (shown.Length == 0) return NiceScale.Over(0, 1, 5, true);
        double low = shown.Min(), high = shown.Max();
        return low > 0.6 * high ? NiceScale.Over(low - (0.1 * (high - low)), high, 6, true) : NiceScale.Over(0, high * 1.02, 6, true);
    }

    private static string Legend(WidthDrawing drawing, NiceScale across)
    {
        WidthPoint[] points = drawing.Points;
        var parts = new List<string>();
        if (points.Any(p => p.WidthM != null)) parts.Add("line and dots: true width, band: its 95 % limits");
        if (points.Any(p => p.Status == StationStatus.Unconstrained)) parts.Add("open circles: apparent width where nothing fixes the dip");
        if (points.Any(p => p.VisibleM != null)) parts.Add("arrows: at least so wide, a margin is hidden");
        parts.Add("lanes A and B: full where the margin shows, hatched where it is hidden");
        if (drawing.Trends.Any(t => t.Kind == WidthTrendKind.Step)) parts.Add("dotted upright: step, with the 95 % limits of its place");
        if (drawing.Trends.Any(t => t.Kind == WidthTrendKind.Taper)) parts.Add("dashed: taper");
        if (drawing.Leans.Any(l => l.LeanDeg is not null))
            parts.Add("lean of margin A full and brown, of B dashed and green, with 95 % limits, positive when the top leans toward B; a gap where a trace is too straight to give it");
        if (drawing.Histogram is not null) parts.Add("bars: widths of the measured stations, which are neighbours and not independent");
        if (across.From > 0) parts.Add("the width axis does not start at zero");
        string text = string.Join("; ", parts) + ".";
        return char.ToUpperInvariant(text[0]) + text[1..];
    }

    private sealed record Frame(float Left, float Top, float Right, float Bottom, NiceScale Along, NiceScale Across)
    {
        public float X(double chainageM) => Left + ((Right - Left) * (float)Along.At(chainageM));

        public float Y(double widthM) => Bottom - ((Bottom - Top) * (float)Across.At(widthM));

        public SKPoint At(double chainageM, double widthM) => new(X(chainageM), Y(widthM));
    }
}
