using CloudStruct.Records.Drawings;
using static System.FormattableString;

namespace CloudStruct.Products.Plots;

/// <summary>Lays out several nets on one sheet of page width, each with its sentence beneath.</summary>
internal static class NetSheetFigure
{
    /// <summary>Width of a page's text: 174 mm.</summary>
    private const float PagePt = 174 / 25.4f * 72;

    private const float Pad = 6, Gap = 14, TickRoom = 8;

    /// <summary>The figure.</summary>
    public static Figure Make(NetSheet sheet, string runId)
    {
        const float inner = PagePt - (2 * Pad);
        int columns = Math.Max(1, Math.Min(sheet.Columns, sheet.Nets.Length));
        float wide = (inner - ((columns - 1) * Gap)) / columns, radius = Math.Min((wide / 2) - TickRoom, 104);
        string[] title = Letters.Title.Wrap(sheet.Title, inner), sentence = Letters.Body.Wrap(sheet.Sentence, inner);
        Panel[] panels = [.. sheet.Nets.Select(n => new Panel(n, Letters.Body.Wrap(n.Title, wide), NetFigure.Key(n), Letters.Body.Wrap(n.Sentence, wide)))];
        bool keys = columns < 3;
        float y = Pad + (title.Length * Letters.Title.Lead) + 4;
        var tops = new List<float>();
        for (int first = 0; first < panels.Length; first += columns)
        {
            tops.Add(y);
            y += panels.Skip(first).Take(columns).Max(p => p.Height(radius, TickRoom, keys)) + 8;
        }

        float sentenceTop = y + 6, runTop = sentenceTop + (sentence.Length * Letters.Body.Lead) + 1;
        return new(sheet.Name, sheet.Title, $"{sheet.Sentence} {string.Join(" ", sheet.Nets.Select(n => Invariant($"{n.Title}: {n.Sentence}")))}".Trim(), PagePt, runTop + Pad, pen =>
        {
            pen.Lines(title, Pad, Pad + 8, Letters.Title, Palette.Ink);
            for (int i = 0; i < panels.Length; i++) Draw(pen, panels[i], Pad + (i % columns * (wide + Gap)), tops[i / columns], wide, radius, keys);
            pen.Lines(sentence, Pad, sentenceTop, Letters.Body, Palette.Ink);
            pen.Text("run " + runId, Pad, runTop, Letters.Small, Palette.Quiet);
        });
    }

    private static void Draw(Pen pen, Panel panel, float left, float top, float wide, float radius, bool keys)
    {
        float middle = left + (wide / 2), y = pen.Lines(panel.Title, left, top + Letters.Body.Size, Letters.Body, Palette.Ink) + TickRoom + (panel.Net.HasNorth ? 8 : 0) + radius;
        NetFigure.Grid(pen, middle, y, radius, panel.Net.HasNorth);
        NetFigure.Contents(pen, panel.Net, middle, y, radius);
        pen.Ring(middle, y, radius, Palette.Ink, 0.9f);
        float baseline = y + radius + TickRoom + 9;
        if (keys)
        {
            foreach (NetFigure.KeyEntry entry in panel.Key)
            {
                NetFigure.Entry(pen, entry, left, baseline);
                baseline += Letters.Body.Lead;
            }
        }

        pen.Lines(panel.Sentence, left, baseline, Letters.Body, Palette.Ink);
    }

    private sealed record Panel(NetDrawing Net, string[] Title, NetFigure.KeyEntry[] Key, string[] Sentence)
    {
        public float Height(float radius, float tickRoom, bool keys) =>
            ((Title.Length + Sentence.Length + (keys ? Key.Length : 0)) * Letters.Body.Lead) + (2 * radius) + (2 * tickRoom) + (Net.HasNorth ? 8 : 0) + 12;
    }
}
