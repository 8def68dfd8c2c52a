using CloudStruct.Records.Drawings;
using SkiaSharp;
using static System.FormattableString;

namespace CloudStruct.Products.Plots;

/// <summary>Lays out a rose of strikes at column width.</summary>
internal static class RoseFigure
{
    private const float Pad = 6, Radius = 78;

    /// <summary>The figure.</summary>
    public static Figure Make(RoseDrawing rose, string runId)
    {
        const float width = Figure.ColumnPt, inner = width - (2 * Pad), x = width / 2;
        string[] title = Letters.Title.Wrap(rose.Title, inner), sentence = Letters.Body.Wrap(rose.Sentence, inner);
        float top = Pad + (title.Length * Letters.Title.Lead) + (rose.HasNorth ? 19 : 10), y = top + Radius;
        float sentenceTop = y + Radius + 16, runTop = sentenceTop + (sentence.Length * Letters.Body.Lead) + 1;
        int all = Math.Max(1, rose.Counts.Sum()), most = Math.Max(1, rose.Counts.Max());

        // The rim is the next round share above the largest class; areas go with shares, so radii with their roots.
        double rim = new[] { 0.1, 0.2, 0.3, 0.4, 0.5, 0.75, 1 }.First(r => r >= (double)most / all || r == 1);
        return new(rose.Name, rose.Title, rose.Sentence, width, runTop + Pad, pen =>
        {
            pen.Lines(title, Pad, Pad + 8, Letters.Title, Palette.Ink);
            foreach (double share in new[] { rim / 4, rim / 2 }) pen.Ring(x, y, (float)Math.Sqrt(share / rim) * Radius, Palette.Hair, 0.4f);
            for (int i = 0; i < rose.Counts.Length; i++)
            {
                if (rose.Counts[i] == 0) continue;
                float radius = (float)Math.Sqrt(rose.Counts[i] / (all * rim)) * Radius;
                Petal(pen, x, y, radius, i * rose.BinDeg, rose.BinDeg);
                Petal(pen, x, y, radius, (i * rose.BinDeg) + 180, rose.BinDeg);
            }

            pen.Ring(x, y, Radius, Palette.Ink, 0.8f);
            for (int azimuth = 0; azimuth < 360; azimuth += 10)
            {
                float length = azimuth % 90 == 0 ? 5 : azimuth % 30 == 0 ? 3.5f : 2;
                (float sin, float cos) = MathF.SinCos(azimuth * MathF.PI / 180);
                pen.Line(x + (Radius * sin), y - (Radius * cos), x + ((Radius + length) * sin), y - ((Radius + length) * cos), Palette.Ink, 0.5f);
            }

            // Shares stand on their rings in the direction with the shortest petals, away from the letter of north.
            int free = Enumerable.Range(2, rose.Counts.Length - 4).MinBy(i => rose.Counts[i - 1] + (2 * rose.Counts[i]) + rose.Counts[i + 1]);
            (double right, double up) = Math.SinCos((free + 0.5) * rose.BinDeg * Math.PI / 180);
            foreach (double share in new[] { rim / 4, rim / 2, rim })
            {
                float r = (float)Math.Sqrt(share / rim) * Radius * (share == rim ? 1.13f : 1);
                pen.TextOnPicture(Invariant($"{100 * share:0.#} %"), x + (r * (float)right), y - (r * (float)up) + 1.8f, Letters.Small, Palette.Quiet, Align.Middle);
            }

            if (rose.HasNorth) pen.Text("N", x, y - Radius - 8, Letters.Title, Palette.Ink, Align.Middle);
            pen.Lines(sentence, Pad, sentenceTop, Letters.Body, Palette.Ink);
            pen.Text("run " + runId, Pad, runTop, Letters.Small, Palette.Quiet);
        });
    }

    private static void Petal(Pen pen, float x, float y, float radius, double fromDeg, double widthDeg)
    {
        SKPoint[] petal = new SKPoint[8];
        petal[0] = new(x, y);
        for (int i = 1; i < petal.Length; i++)
        {
            (double sin, double cos) = Math.SinCos((fromDeg + (widthDeg * (i - 1) / (petal.Length - 2))) * Math.PI / 180);
            petal[i] = new(x + (radius * (float)sin), y - (radius * (float)cos));
        }

        pen.Fill(petal, new SKColor(0x6F, 0xA8, 0xCC));
        pen.Line([.. petal, petal[0]], Palette.Measured, 0.5f);
    }
}
