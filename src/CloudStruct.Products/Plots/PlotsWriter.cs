using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using static System.FormattableString;

namespace CloudStruct.Products.Plots;

/// <summary>Writes every plot as SVG, PDF and PNG, and every view as PNG.</summary>
internal static class PlotsWriter
{
    /// <summary>Pixels per point of the views inside the report: as wide as the page on a screen, a quarter of the bytes.</summary>
    private const float ScreenPerPoint = 2;

    /// <summary>Lays out nets and width profiles, in the order of the drawings.</summary>
    public static IEnumerable<Figure> Figures(Findings findings, DrawingsRecord drawings, RunFacts facts)
    {
        foreach (NetDrawing net in drawings.Nets) yield return NetFigure.Make(net, facts.RunId);
        foreach (NetSheet sheet in drawings.NetSheets) yield return NetSheetFigure.Make(sheet, facts.RunId);
        foreach (RoseDrawing rose in drawings.Roses) yield return RoseFigure.Make(rose, facts.RunId);
        foreach (CrossSection section in drawings.Sections.Where(s => s.OnSheet))
        {
            if (SectionFigure.Make(section, facts.RunId) is { } figure) yield return figure;
        }

        if (drawings.Map is { } map) yield return Map.MapFigure.Make(map, drawings.Surface, findings.Intake.Frame, facts.RunId);
        foreach (WidthDrawing width in drawings.Widths)
            yield return WidthFigure.Make(width, FrameWords.Toward(findings, width.Dike), facts.RunId, Invariant($"width-dike-{width.Dike}"));
    }

    /// <summary>Lays out a view.</summary>
    public static Figure View(Findings findings, ViewImage view, RunFacts facts) =>
        ViewFigure.Make(view, findings.Intake.Frame.North != North.Model, facts.RunId);

    /// <summary>The work of making every sheet, each piece apart from the others, and what writes them once all is done.</summary>
    public static (List<Action> Work, Func<ResultFolder, List<DrawnPlot>> Finish) Plan(Findings findings, DrawingsRecord drawings, RunFacts facts)
    {
        Figure[] figures = [.. Figures(findings, drawings, facts)];
        byte[][] made = new byte[(2 * drawings.Views.Length) + (3 * figures.Length)][];
        var work = new List<Action>();
        for (int v = 0; v < drawings.Views.Length; v++)
        {
            ViewImage view = drawings.Views[v];
            Figure figure = View(findings, view, facts);
            int at = 2 * v;
            work.Add(() => made[at] = FigureFiles.Png(figure, facts.RunId, ViewFigure.PerPoint(view)));
            work.Add(() => made[at + 1] = FigureFiles.Png(figure, facts.RunId, ScreenPerPoint));
        }

        for (int f = 0; f < figures.Length; f++)
        {
            Figure figure = figures[f];
            int at = (2 * drawings.Views.Length) + (3 * f);
            work.Add(() => made[at] = FigureFiles.Svg(figure, facts.RunId));
            work.Add(() => made[at + 1] = FigureFiles.Pdf(figure, facts));
            work.Add(() => made[at + 2] = FigureFiles.Png(figure, facts.RunId));
        }

        return (work, files => Write(files, drawings.Views, figures, made));
    }

    private static List<DrawnPlot> Write(ResultFolder files, ViewImage[] views, Figure[] figures, byte[][] made)
    {
        var drawn = new List<DrawnPlot>();
        int at = 2 * views.Length;
        foreach (Figure figure in figures)
        {
            (byte[] svg, byte[] pdf, byte[] png) = (made[at], made[at + 1], made[at + 2]);
            at += 3;
            files.Write($"plots/{figure.Name}.svg", svg);
            files.Write($"plots/{figure.Name}.pdf", pdf);
            files.Write($"plots/{figure.Name}.png", png);
            drawn.Add(new DrawnPlot(figure.Name, figure.Title, figure.Words, svg, png));
        }

        for (int v = 0; v < views.Length; v++)
        {
            files.Write($"plots/{views[v].Name}.png", made[2 * v]);
            drawn.Add(new DrawnPlot(views[v].Name, views[v].Title, views[v].Sentence, [], made[(2 * v) + 1]));
        }

        return drawn;
    }
}
