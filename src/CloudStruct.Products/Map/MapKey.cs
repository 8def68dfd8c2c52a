using CloudStruct.Products.Plots;
using CloudStruct.Records.Drawings;
using SkiaSharp;

namespace CloudStruct.Products.Map;

/// <summary>The key of the map: only what stands on it.</summary>
internal static class MapKey
{
    /// <summary>Height of a row [pt].</summary>
    public const float RowPt = 15;

    private const float SymbolPt = 26, Gap = 12;

    /// <summary>Rows that the key takes at a width.</summary>
    public static int Rows(MapDrawing map, float width) => Places(map, 0, 0, width).Select(p => p.Row + 1).DefaultIfEmpty(0).Max();

    /// <summary>Draws it.</summary>
    public static void Draw(Pen pen, MapDrawing map, float left, float top, float width)
    {
        foreach ((Entry entry, float x, float y, int _) in Places(map, left, top, width))
        {
            entry.Draw(pen, new SKPoint(x + (SymbolPt / 2) - 3, y + (RowPt / 2)));
            pen.Text(entry.Label, x + SymbolPt, y + (RowPt / 2) + (Letters.Body.Size * 0.36f), Letters.Body, Palette.Ink);
        }
    }

    private static IEnumerable<(Entry Entry, float X, float Y, int Row)> Places(MapDrawing map, float left, float top, float width)
    {
        float x = left;
        int row = 0;
        foreach (Entry e in Entries(map))
        {
            float wide = SymbolPt + Letters.Body.Measure(e.Label) + Gap;
            if (x + wide - Gap > left + width && x > left) (x, row) = (left, row + 1);
            yield return (e, x, top + (row * RowPt), row);
            x += wide;
        }
    }

    private static IEnumerable<Entry> Entries(MapDrawing map)
    {
        bool Host(MapSymbol s) => s.Domain is not ("contact" or "dike" or "margin");
        if (map.Symbols.Any(s => s.Kind == "inclined" && Host(s))) yield return new("dip of a face in the host", Symbol("inclined", "host"));
        if (map.Symbols.Any(s => s.Kind == "vertical" && s.Domain != "contact")) yield return new("upright face", Symbol("vertical", "host"));
        if (map.Symbols.Any(s => s.Kind == "horizontal" && s.Domain != "contact")) yield return new("face level within 5 deg", Symbol("horizontal", "host"));
        if (map.Symbols.Any(s => s.Domain is "dike" or "margin")) yield return new("face in the dike or on its contact", Symbol("inclined", "dike"));
        if (map.Symbols.Any(s => s.Domain == "contact")) yield return new("attitude of a contact", Symbol("inclined", "contact"));
        if (map.Lines.Any(l => l.Kind == "contact")) yield return new("contact, traced", Line(false));
        if (map.Lines.Any(l => l.Kind == "concealed")) yield return new("contact, concealed", Line(true));
        if (map.DikeAreas.Length > 0)
        {
            yield return new("dike between contacts that show", (pen, at) =>
                pen.Box(at.X - 8, at.Y - 4, at.X + 8, at.Y + 4, new SKColor(0xF0, 0xC4, 0xA2)));
        }

        if (map.Stations.Length > 0)
        {
            yield return new("station with its chainage", (pen, at) => pen.Line(at.X, at.Y - 4, at.X, at.Y + 4, Palette.Measured, 1));
        }
    }

    private static Action<Pen, SKPoint> Symbol(string kind, string domain) => (pen, at) =>
        MapSymbols.Draw(pen, new MapSymbol(default, kind, 90, 35, 0, "", domain), new SKPoint(at.X, at.Y - 2.5f));

    private static Action<Pen, SKPoint> Line(bool concealed) => (pen, at) =>
        MapFigure.Contact(pen, [new(at.X - 9, at.Y), new(at.X + 9, at.Y)], concealed);

    private sealed record Entry(string Label, Action<Pen, SKPoint> Draw);
}
