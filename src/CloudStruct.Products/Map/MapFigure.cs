using CloudStruct.Products.Plots;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Width;
using SkiaSharp;
using static System.FormattableString;

namespace CloudStruct.Products.Map;

/// <summary>Lays out the structural map at page width and at a round scale: picture with relief, grid, dike, contacts, symbols.</summary>
internal static class MapFigure
{
    /// <summary>Width of a page's text: 174 mm.</summary>
    private const float PagePt = 174 / 25.4f * 72;

    private const float Pad = 6, LabelRoom = 11, PerMm = 72 / 25.4f, StationMm = 2.2f, Unseen = 0xF4;

    /// <summary>Columns of the picture at most: 150 dots per inch over the page.</summary>
    private const int MostPictureColumns = 1000;

    /// <summary>Ground of a dike, let through to the picture.</summary>
    private static readonly SKColor DikeTint = new(0xD5, 0x5E, 0x00, 0x46);

    /// <summary>The figure.</summary>
    /// <param name="map">What to draw where.</param>
    /// <param name="surface">Picture beneath; null draws on white.</param>
    /// <param name="frame">For map coordinates.</param>
    /// <param name="runId">For the small print.</param>
    public static Figure Make(MapDrawing map, SurfaceRaster? surface, SurveyFrame frame, string runId)
    {
        const float inner = PagePt - (2 * Pad);
        string[] title = Letters.Title.Wrap(map.Title, inner), sentence = Letters.Body.Wrap(map.Sentence, inner);
        float perM = (float)(1000 * PerMm / map.Scale);
        float width = (float)(map.RightM - map.LeftM) * perM, height = (float)(map.TopM - map.BottomM) * perM;
        float left = Pad + LabelRoom + Math.Max(0, (inner - LabelRoom - width) / 2), top = Pad + (title.Length * Letters.Title.Lead) + 3;
        float bottom = top + height, barTop = bottom + LabelRoom + 9;
        float keyTop = barTop + 24 + Letters.Body.Lead, sentenceTop = keyTop + (MapKey.Rows(map, inner) * MapKey.RowPt) + 8;
        float runTop = sentenceTop + (sentence.Length * Letters.Body.Lead) + 1;
        var sheet = new MapSheet(map, frame.Origin, left, top, perM);
        double barM = NiceScale.StepFor((map.RightM - map.LeftM) / 6);
        return new("map-structures", map.Title, map.Sentence, PagePt, runTop + Pad, pen =>
        {
            pen.Lines(title, Pad, Pad + 8, Letters.Title, Palette.Ink);
            if (surface is not null) pen.Picture(Picture(surface), sheet.Box(surface, Step(surface)));
            Grid(pen, sheet);
            foreach (MapLine area in map.DikeAreas) pen.Fill([.. area.Points.Select(sheet.At)], DikeTint);
            foreach (MapLine line in map.Lines) Contact(pen, [.. line.Points.Select(sheet.At)], line.Kind == "concealed");
            foreach (MapStation s in map.Stations) Station(pen, sheet, s);
            foreach (MapSymbol s in map.Symbols) MapSymbols.Draw(pen, s, sheet.At(s.At));
            pen.Line(
                [new(left, top), new(left + width, top), new(left + width, bottom), new(left, bottom), new(left, top)], Palette.Ink, 0.7f);
            ViewFigure.Bar(pen, Pad, barTop, (float)barM * perM, barM);
            if (map.UpAzimuthDeg is { } up)
            {
                ViewFigure.Arrow(pen, PagePt - Pad - 20, barTop + 10, up);
                pen.Text(map.NorthIsTrue ? "true north" : "grid north", PagePt - Pad - 20, barTop + 28, Letters.Small, Palette.Quiet, Align.Middle);
            }

            MapKey.Draw(pen, map, Pad, keyTop, inner);
            pen.Lines(sentence, Pad, sentenceTop, Letters.Body, Palette.Ink);
            pen.Text("run " + runId, Pad, runTop, Letters.Small, Palette.Quiet);
        });
    }

    /// <summary>A contact: full where it was traced, dotted where it is concealed.</summary>
    internal static void Contact(Pen pen, SKPoint[] points, bool concealed)
    {
        pen.Line(points, new SKColor(0xFF, 0xFF, 0xFF, 0xC8), 2.4f);
        pen.Line(points, Palette.Ink, 1.1f, concealed ? [1.1f, 2.2f] : null);
    }

    private static void Grid(Pen pen, MapSheet sheet)
    {
        var line = new SKColor(0xFF, 0xFF, 0xFF, 0x90);
        foreach ((double value, float x) in sheet.Eastings())
        {
            pen.Line(x, sheet.Top, x, sheet.Bottom, line, 0.5f);
            pen.Line(x, sheet.Bottom, x, sheet.Bottom + 3, Palette.Ink, 0.5f);
            pen.Text(Invariant($"{value:0.###} E"), x, sheet.Bottom + 3 + Letters.Axis.Size, Letters.Axis, Palette.Ink, Align.Middle);
        }

        foreach ((double value, float y) in sheet.Northings())
        {
            pen.Line(sheet.Left, y, sheet.Right, y, line, 0.5f);
            pen.Line(sheet.Left - 3, y, sheet.Left, y, Palette.Ink, 0.5f);
            pen.Text(Invariant($"{value:0.###} N"), sheet.Left - 4.5f, y, Letters.Axis, Palette.Ink, Align.Middle, upright: true);
        }
    }

    private static void Station(Pen pen, MapSheet sheet, MapStation s)
    {
        SKPoint at = sheet.At(s.At);
        (float sin, float cos) = MathF.SinCos((float)s.AcrossGridDeg * MathF.PI / 180);
        float half = StationMm / 2 * PerMm * (s.Label.Length > 0 ? 1.6f : 1);
        bool measured = s.Status == StationStatus.Measured;
        pen.Line(at.X - (half * sin), at.Y + (half * cos), at.X + (half * sin), at.Y - (half * cos), new SKColor(0xFF, 0xFF, 0xFF, 0xC8), 1.8f);
        pen.Line([new(at.X - (half * sin), at.Y + (half * cos)), new(at.X + (half * sin), at.Y - (half * cos))],
            measured ? Palette.Measured : Palette.Quiet, measured ? 0.9f : 0.6f, measured ? null : [1, 1]);
        if (s.Label.Length == 0) return;
        SKPoint label = sheet.At(s.LabelAt);
        pen.TextOnPicture(s.Label, label.X, label.Y + (Letters.Axis.Size * 0.36f), Letters.Axis, Palette.Measured, Align.Middle);
    }

    // Colour under half light, a quarter faded toward white: symbols must stand out, the rock must stay recognisable. Blocks
    // of pixels are averaged, because sheets in SVG and PDF carry the picture packed without loss.
    private static SKImage Picture(SurfaceRaster surface)
    {
        int step = Step(surface);
        int width = surface.Width / step, height = surface.Height / step;
        byte[] rgba = new byte[4 * width * height];
        for (int y = 0; y < height; y++)
        {
            for (int x = 0; x < width; x++) Average(surface, x * step, y * step, step, rgba.AsSpan(4 * ((y * width) + x), 4));
        }

        return SKImage.FromPixelCopy(new SKImageInfo(width, height, SKColorType.Rgba8888, SKAlphaType.Opaque), rgba);
    }

    private static int Step(SurfaceRaster surface) =>
        Math.Clamp((Math.Max(surface.Width, surface.Height) + MostPictureColumns - 1) / MostPictureColumns, 1, Math.Max(1, Math.Min(surface.Width, surface.Height)));

    private static void Average(SurfaceRaster surface, int left, int top, int step, Span<byte> rgba)
    {
        float red = 0, green = 0, blue = 0;
        int count = 0;
        for (int y = top; y < Math.Min(top + step, surface.Height); y++)
        {
            for (int x = left; x < Math.Min(left + step, surface.Width); x++)
            {
                int p = (y * surface.Width) + x;
                if (surface.Light[p] == 0) (red, green, blue) = (red + Unseen, green + Unseen, blue + Unseen);
                else
                {
                    float light = (0.5f + (0.6f * surface.Light[p] / 255f)) * 0.75f;
                    red += 64 + (surface.Rgba[4 * p] * light);
                    green += 64 + (surface.Rgba[(4 * p) + 1] * light);
                    blue += 64 + (surface.Rgba[(4 * p) + 2] * light);
                }

                count++;
            }
        }

        (rgba[0], rgba[1], rgba[2], rgba[3]) = ((byte)Math.Min(255, red / count), (byte)Math.Min(255, green / count), (byte)Math.Min(255, blue / count), 255);
    }
}
