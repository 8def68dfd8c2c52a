using CloudStruct.Records.Drawings;
using SkiaSharp;
using static System.FormattableString;

namespace CloudStruct.Products.Plots;

/// <summary>Lays out an equal-area lower-hemisphere net at column width: title above, key and statistics beneath.</summary>
internal static class NetFigure
{
    private const float Pad = 6, TickRoom = 8, KeySymbol = 20, KeyGap = 10;

    /// <summary>Above so many poles marks shrink, down to half: they would run into one blot.</summary>
    private const int ManyPoles = 300;

    /// <summary>The figure of one net.</summary>
    /// <param name="net">What to draw.</param>
    /// <param name="runId">For the small print.</param>
    public static Figure Make(NetDrawing net, string runId)
    {
        const float width = Figure.ColumnPt, inner = width - (2 * Pad);
        string[] title = Letters.Title.Wrap(net.Title, inner);
        KeyEntry[] key = Key(net);
        string[] legend = Letters.Body.Wrap(Legend(net), inner), sentence = Letters.Body.Wrap(net.Sentence, inner);
        float radius = (inner / 2) - TickRoom;
        float top = Pad + (title.Length * Letters.Title.Lead) + (net.HasNorth ? 11 : 2) + TickRoom;
        float middleX = width / 2, middleY = top + radius, keyTop = middleY + radius + TickRoom + 11;
        float column = key.Length == 0 ? inner : key.Max(k => Letters.Body.Measure(k.Label)) + KeySymbol + KeyGap;
        int columns = Math.Clamp((int)((inner + KeyGap) / column), 1, Math.Max(1, key.Length));
        int rows = (key.Length + columns - 1) / columns;
        float legendTop = keyTop + (rows * Letters.Body.Lead) + (rows > 0 ? 2 : 0);
        float sentenceTop = legendTop + (legend.Length * Letters.Body.Lead) + (legend.Length > 0 ? 2 : 0);
        float runTop = sentenceTop + (sentence.Length * Letters.Body.Lead) + 1;
        return new(net.Name, net.Title, net.Sentence, width, runTop + Pad, pen =>
        {
            pen.Lines(title, Pad, Pad + 8, Letters.Title, Palette.Ink);
            Grid(pen, middleX, middleY, radius, net.HasNorth);
            Contents(pen, net, middleX, middleY, radius);
            pen.Ring(middleX, middleY, radius, Palette.Ink, 0.9f);
            for (int i = 0; i < key.Length; i++)
            {
                Entry(pen, key[i], Pad + ((i % columns) * (inner + KeyGap) / columns), keyTop + (i / columns * Letters.Body.Lead));
            }
            pen.Lines(legend, Pad, legendTop, Letters.Body, Palette.Ink);
            pen.Lines(sentence, Pad, sentenceTop, Letters.Body, Palette.Ink);
            pen.Text("run " + runId, Pad, runTop, Letters.Small, Palette.Quiet);
        });
    }

    internal static void Grid(Pen pen, float x, float y, float radius, bool hasNorth)
    {
        for (int azimuth = 0; azimuth < 360; azimuth += 10)
        {
            float length = azimuth % 90 == 0 ? 5 : azimuth % 30 == 0 ? 3.5f : 2;
            (float sin, float cos) = MathF.SinCos(azimuth * MathF.PI / 180);
            pen.Line(x + (radius * sin), y - (radius * cos), x + ((radius + length) * sin), y - ((radius + length) * cos), Palette.Ink, 0.5f);
        }
        pen.Line(x - 3, y, x + 3, y, Palette.Hair, 0.6f);
        pen.Line(x, y - 3, x, y + 3, Palette.Hair, 0.6f);
        if (hasNorth) pen.Text("N", x, y - radius - TickRoom, Letters.Title, Palette.Ink, Align.Middle);
    }

    internal static void Contents(Pen pen, NetDrawing net, float x, float y, float radius)
    {
        double[] levels = [.. net.Curves.Where(c => c.Kind == "contour").Select(c => c.Level).Distinct().Order()];
        float shrink = MathF.Max(0.5f, MathF.Min(1, MathF.Sqrt((float)ManyPoles / Math.Max(1, net.Poles.Length))));
        foreach (NetPole pole in net.Poles.OrderBy(p => p.Group.Length > 0).ThenByDescending(p => p.AreaM2).ThenBy(p => p.FaceId))
        {
            float px = x + (float)(pole.At.X * radius), py = y - (float)(pole.At.Y * radius);
            pen.Mark(Style(net, pole.Group), px, py, Size(pole.AreaM2) * shrink);
        }
        // Over the poles, as thin as prints: beneath them the inner contours of a dense set did not show, on a white bed they hid it.
        foreach (NetCurve curve in net.Curves.Where(c => c.Kind == "contour"))
        {
            int rank = Array.IndexOf(levels, curve.Level);
            byte grey = (byte)Math.Max(0x30, 0x90 - (rank * 0x18));
            pen.Line(Place(curve.Points, x, y, radius), new SKColor(grey, grey, grey), Math.Min(0.65f, 0.4f + (rank * 0.05f)));
        }

        // White beneath, so that curves stay readable where marks are dense; cones of single poles are many and stay thin.
        HashSet<string> planes = [.. net.Curves.Where(c => c.Kind == "great_circle").Select(c => c.Group)];
        foreach (NetCurve curve in net.Curves.Where(c => c.Kind != "contour"))
        {
            GroupStyle style = Style(net, curve.Group);
            bool cone = curve.Kind == "cone", ofMean = planes.Contains(curve.Group);
            SKPoint[] points = Place(curve.Points, x, y, radius);
            if (ofMean) pen.Line(points, SKColors.White, cone ? 2.4f : 2f);
            pen.Line(points, cone && ofMean ? Palette.Ink : style.Colour, cone ? (ofMean ? 0.9f : 0.5f) : 1.1f, cone ? null : style.Dashes);
        }
    }

    // Diameter [pt]: with the fourth root of the area, a face a hundred times larger has a mark three times as wide.
    private static float Size(double areaM2) =>
        areaM2 > 0 ? (float)Math.Clamp(3.6 * Math.Pow(areaM2, 0.25), 1.8, 7) : 4;

    private static SKPoint[] Place(Point2[] points, float x, float y, float radius) =>
        [.. points.Select(p => new SKPoint(x + (float)(p.X * radius), y - (float)(p.Y * radius)))];

    private static GroupStyle Style(NetDrawing net, string group)
    {
        int n = Array.IndexOf(net.Groups, group);
        return n >= 0 ? Palette.Group(n) : new(Palette.NoSet, MarkShape.Circle, group.Length == 0, []);
    }

    internal static KeyEntry[] Key(NetDrawing net)
    {
        ILookup<string, NetPole> poles = net.Poles.ToLookup(p => Array.IndexOf(net.Groups, p.Group) >= 0 ? p.Group : "");
        IEnumerable<KeyEntry> entries = net.Groups.Select(g => new KeyEntry(
            Style(net, g), net.Curves.Any(c => c.Group == g && c.Kind == "great_circle"), Invariant($"{g} ({poles[g].Count()})")));
        int others = poles[""].Count();
        return [.. entries, .. others == 0 ? [] : new[]
        {
            new KeyEntry(Style(net, ""), false, Invariant($"{(net.Groups.Length > 0 ? "in no set" : "poles")} ({others})")),
        }];
    }

    internal static void Entry(Pen pen, KeyEntry entry, float x, float baseline)
    {
        float y = baseline - (Letters.Body.Size * 0.36f);
        if (entry.HasLine) pen.Line([new(x, y), new(x + KeySymbol - 5, y)], entry.Style.Colour, 1.1f, entry.Style.Dashes);
        pen.Mark(entry.Style, x + ((KeySymbol - 5) / 2), y, 5);
        pen.Text(entry.Label, x + KeySymbol, baseline, Letters.Body, Palette.Ink);
    }

    private static string Legend(NetDrawing net)
    {
        var parts = new List<string>();
        // Marks without an area are poles or directions of contacts: the key names them.
        if (net.Poles.Any(p => p.AreaM2 > 0)) parts.Add("marks: poles, wider for larger faces");
        if (net.Curves.Any(c => c.Kind == "great_circle")) parts.Add("coloured curves: mean planes");
        if (net.Curves.Any(c => c.Kind == "cone")) parts.Add("rings about poles: 95 % cones");
        if (net.Curves.Any(c => c.Kind == "contour")) parts.Add("grey: contours, darker for denser");
        if (parts.Count == 0) return "";
        string text = string.Join("; ", parts) + ".";
        return char.ToUpperInvariant(text[0]) + text[1..];
    }

    internal sealed record KeyEntry(GroupStyle Style, bool HasLine, string Label);
}
