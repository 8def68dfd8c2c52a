using CloudStruct.Records.Comparing;
using SkiaSharp;

namespace CloudStruct.Products.Plots;

/// <summary>Lays out how differences are distributed beside what the stated regions predict: shares below a value.</summary>
internal static class SharesFigure
{
    private const float Pad = 6, PlotHeight = 150, KeyLine = 18;

    /// <summary>The figure of one comparison.</summary>
    public static Figure Make(ComparisonRecord record, string runId)
    {
        const float width = Figure.ColumnPt, inner = width - (2 * Pad);
        string words = string.Join(' ', record.Sentences);
        string[] title = Letters.Title.Wrap(record.Title, inner), sentence = Letters.Body.Wrap(words, inner);
        double most = record.Curves.Where(c => !c.Expected).SelectMany(c => c.X.Skip((int)(0.97 * c.X.Length)).Take(1)).Append(3.5).Max();
        NiceScale across = NiceScale.Over(0, most, 7, true), up = NiceScale.Over(0, 1, 5, true);
        float left = Pad + Letters.Body.Lead + up.Ticks().Max(t => Letters.Axis.Measure(up.Label(t))) + 5, right = width - Pad - 5;
        float top = Pad + (title.Length * Letters.Title.Lead) + 4, bottom = top + PlotHeight;
        float tickBaseline = bottom + 5 + Letters.Axis.Size, axisBaseline = tickBaseline + Letters.Body.Lead + 0.5f, keyTop = axisBaseline + Letters.Body.Lead + 2;
        float sentenceTop = keyTop + (record.Curves.Length * Letters.Body.Lead) + 2, runTop = sentenceTop + (sentence.Length * Letters.Body.Lead) + 1;
        return new(record.Name, record.Title, words, width, runTop + Pad, pen =>
        {
            pen.Lines(title, Pad, Pad + 8, Letters.Title, Palette.Ink);
            foreach (double t in up.Ticks())
            {
                float y = bottom - (PlotHeight * (float)up.At(t));
                pen.Line(left, y, right, y, Palette.Hair, 0.3f);
                pen.Text(up.Label(t), left - 4, y + (Letters.Axis.Size * 0.36f), Letters.Axis, Palette.Ink, Align.Right);
            }

            foreach (double t in across.Ticks())
            {
                float x = left + ((right - left) * (float)across.At(t));
                pen.Line(x, bottom, x, bottom + 3, Palette.Ink, 0.5f);
                pen.Text(across.Label(t), x, tickBaseline, Letters.Axis, Palette.Ink, Align.Middle);
            }

            pen.Line(left, bottom, right, bottom, Palette.Ink, 0.6f);
            pen.Line(left, top, left, bottom, Palette.Ink, 0.6f);
            for (int i = 0; i < record.Curves.Length; i++)
            {
                (SKColor colour, float weight, float[]? dashes) = Style(record.Curves, i);
                pen.Line(Points(record.Curves[i], left, right, bottom, across), colour, weight, dashes);
                float y = keyTop + (i * Letters.Body.Lead) - (Letters.Body.Size * 0.36f);
                pen.Line([new(Pad, y), new(Pad + KeyLine - 4, y)], colour, weight, dashes);
                pen.Text(record.Curves[i].Label, Pad + KeyLine, keyTop + (i * Letters.Body.Lead), Letters.Body, Palette.Ink);
            }

            pen.Text("share at or below", Pad + Letters.Body.Size, (top + bottom) / 2, Letters.Body, Palette.Ink, Align.Middle, upright: true);
            pen.Text(record.Axis, (left + right) / 2, axisBaseline, Letters.Body, Palette.Ink, Align.Middle);
            pen.Lines(sentence, Pad, sentenceTop, Letters.Body, Palette.Ink);
            pen.Text("run " + runId, Pad, runTop, Letters.Small, Palette.Quiet);
        });
    }

    private static (SKColor Colour, float Weight, float[]? Dashes) Style(ShareCurve[] curves, int i)
    {
        int rank = curves.Take(i).Count(c => c.Expected == curves[i].Expected);
        return curves[i].Expected ? (Palette.Ink, 0.8f, rank == 0 ? null : [3, 2]) : (Palette.Group(rank).Colour, 1.5f, null);
    }

    // Steps for a sample, a smooth line for what is predicted; what lies beyond the axis ends at it.
    private static SKPoint[] Points(ShareCurve curve, float left, float right, float bottom, NiceScale across)
    {
        var points = new List<SKPoint>();
        double before = 0;
        if (!curve.Expected) points.Add(new(left, bottom));
        for (int k = 0; k < curve.X.Length; k++)
        {
            double at = across.At(curve.X[k]);
            if (at > 1) break;
            float x = left + ((right - left) * (float)at);
            if (!curve.Expected) points.Add(new(x, bottom - (PlotHeight * (float)before)));
            points.Add(new(x, bottom - (PlotHeight * (float)curve.Share[k])));
            before = curve.Share[k];
        }

        if (!curve.Expected) points.Add(new(right, bottom - (PlotHeight * (float)before)));
        return [.. points];
    }
}
