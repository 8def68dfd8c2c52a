using CloudStruct.Records.Classes;
using CloudStruct.Records.Drawings;
using SkiaSharp;
using static System.FormattableString;

namespace CloudStruct.Products.Plots;

/// <summary>Lays out a cross-section of a dike at a station at column width: rock by class, margins, lean; heights as they are.</summary>
internal static class SectionFigure
{
    private const float Pad = 6, MostHeightPt = 190;

    /// <summary>The figure; null when the slice holds no point.</summary>
    public static Figure? Make(CrossSection section, string runId)
    {
        if (section.Across.Length == 0) return null;
        const float width = Figure.ColumnPt, inner = width - (2 * Pad);
        string name = Invariant($"section-dike-{section.Dike}-station-{section.Station}"), heading = Invariant($"Dike {section.Dike} at station {section.Station}, chainage {section.ChainageM:0.##} m");
        string[] title = Letters.Title.Wrap(heading, inner), sentence = Letters.Body.Wrap(section.Sentence, inner);
        (RockClass Class, string Label)[] key = [.. Shown.Where(s => section.Class.Contains((byte)s.Class))];
        double across = Math.Max(0.5, section.Across.Max(Math.Abs)) * 1.02, low = section.Up.Min(), high = section.Up.Max();
        float left = Pad + Letters.Body.Lead + 24, right = width - Pad - 4, perM = (right - left) / (float)(2 * across);
        if ((high - low) * perM > MostHeightPt) perM = MostHeightPt / (float)(high - low);
        double room = Math.Max(high - low, 0.3 * across);
        (low, high) = (((low + high) / 2) - (room * 0.56), ((low + high) / 2) + (room * 0.56));
        float top = Pad + (title.Length * Letters.Title.Lead) + 14, middle = (left + right) / 2, bottom = top + ((float)(high - low) * perM);
        float tickBaseline = bottom + 5 + Letters.Axis.Size, axisBaseline = tickBaseline + Letters.Body.Lead, keyTop = axisBaseline + Letters.Body.Lead + 2;
        float sentenceTop = keyTop + Letters.Body.Lead + 3, runTop = sentenceTop + (sentence.Length * Letters.Body.Lead) + 1;
        return new(name, heading, section.Sentence, width, runTop + Pad, pen =>
        {
            SKPoint At(double x, double y) => new(middle + ((float)x * perM), bottom - ((float)(y - low) * perM));
            pen.Lines(title, Pad, Pad + 8, Letters.Title, Palette.Ink);
            double step = NiceScale.StepFor((right - left) / perM / 7);
            for (double h = Math.Ceiling((low + section.HeightAtM) / step) * step; h <= high + section.HeightAtM; h += step)
            {
                float y = At(0, h - section.HeightAtM).Y;
                pen.Line(left, y, right, y, Palette.Hair, 0.35f);
                pen.Text(Invariant($"{h:0.##}"), left - 3, y + (Letters.Axis.Size * 0.36f), Letters.Axis, Palette.Ink, Align.Right);
            }

            Dots(pen, section, At);
            Margins(pen, section, At, top, bottom, left, right);
            pen.Line([new(left, top), new(right, top), new(right, bottom), new(left, bottom), new(left, top)], Palette.Ink, 0.6f);
            double half = (right - left) / perM / 2;
            for (double x = Math.Ceiling(-half / step) * step; x <= half; x += step)
            {
                pen.Line(At(x, low).X, bottom, At(x, low).X, bottom + 3, Palette.Ink, 0.6f);
                pen.Text(Invariant($"{(Math.Abs(x) < 1e-9 ? 0 : x):0.##}"), At(x, low).X, tickBaseline, Letters.Axis, Palette.Ink, Align.Middle);
            }

            pen.Text("side A", left, top - 4, Letters.Axis, Palette.Ink);
            pen.Text("side B", right, top - 4, Letters.Axis, Palette.Ink, Align.Right);
            pen.Text(Invariant($"across (m), seen toward {section.LookingDeg:000} deg"), middle, axisBaseline, Letters.Body, Palette.Ink, Align.Middle);
            pen.Text("height (m)", Pad + Letters.Body.Size, (top + bottom) / 2, Letters.Body, Palette.Ink, Align.Middle, upright: true);
            float at = Pad;
            foreach ((RockClass rock, string label) in key)
            {
                pen.Box(at, keyTop - 5, at + 7, keyTop, Colour((byte)rock));
                pen.Text(label, at + 10, keyTop, Letters.Body, Palette.Ink);
                at += 10 + Letters.Body.Measure(label) + 10;
            }

            pen.Lines(sentence, Pad, sentenceTop, Letters.Body, Palette.Ink);
            pen.Text("run " + runId, Pad, runTop, Letters.Small, Palette.Quiet);
        });
    }

    private static readonly (RockClass Class, string Label)[] Shown =
        [(RockClass.Host, "host"), (RockClass.Dike, "dike"), (RockClass.Inclusion, "inclusion"), (RockClass.Cover, "cover"), (RockClass.Loose, "loose")];

    private static void Dots(Pen pen, CrossSection s, Func<double, double, SKPoint> at)
    {
        for (int i = 0; i < s.Across.Length; i++) pen.Dot(at(s.Across[i], s.Up[i]), 0.55f, Colour(s.Class.Length > i ? s.Class[i] : (byte)RockClass.Unknown));
    }

    // Where a margin was seen, and the plane of the dike through it, as far as the sheet goes.
    private static void Margins(Pen pen, CrossSection s, Func<double, double, SKPoint> at, float top, float bottom, float left, float right)
    {
        foreach ((Point2? margin, string name) in new[] { (s.AtA, "A"), (s.AtB, "B") })
        {
            if (margin is not { } m) continue;
            SKPoint p = at(m.X, m.Y);
            if (s.LeanToBDeg is { } lean && Math.Abs(lean) < 85)
            {
                float slope = (float)Math.Tan(lean * Math.PI / 180);
                SKPoint up = new(p.X + ((p.Y - top) * slope), top), down = new(p.X - ((bottom - p.Y) * slope), bottom);
                if (Cut(ref up, ref down, left, right)) pen.Line([up, down], Palette.Ink, 0.8f, [4, 2]);
            }

            pen.Mark(new GroupStyle(Palette.Ink, name == "A" ? MarkShape.TriangleDown : MarkShape.TriangleUp, false, []), p.X, p.Y, 4.6f);
            pen.TextOnPicture(name, p.X + (name == "A" ? -6 : 6), p.Y - 3, Letters.Axis, Palette.Ink, name == "A" ? Align.Right : Align.Left);
        }
    }

    private static bool Cut(ref SKPoint a, ref SKPoint b, float left, float right)
    {
        if (Math.Max(a.X, b.X) < left || Math.Min(a.X, b.X) > right) return false;
        (SKPoint from, SKPoint to) = (a, b);
        a = Moved(from, to);
        b = Moved(to, from);
        return true;

        SKPoint Moved(SKPoint p, SKPoint other)
        {
            float x = Math.Clamp(p.X, left, right);
            return x == p.X || other.X == p.X ? p : new SKPoint(x, p.Y + ((x - p.X) / (other.X - p.X) * (other.Y - p.Y)));
        }
    }

    private static SKColor Colour(byte rock) => (RockClass)rock switch
    {
        RockClass.Host => new(0x56, 0xB4, 0xE9),
        RockClass.Dike => new(0xD5, 0x5E, 0x00),
        RockClass.Cover => new(0x00, 0x9E, 0x73),
        RockClass.Inclusion => new(0xCC, 0x79, 0xA7),
        RockClass.Loose => new(0xE6, 0x9F, 0x00),
        _ => new(0x80, 0x80, 0x80),
    };
}
