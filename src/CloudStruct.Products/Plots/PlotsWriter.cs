using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Stages;
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
        if (drawings.Map is { } map) yield return Map.MapFigure.Make(map, drawings.Surface, findings.Intake.Frame, facts.RunId);
        foreach (WidthDrawing width in drawings.Widths)
            yield return WidthFigure.Make(width, FrameWords.Toward(findings, width.Dike), facts.RunId, Invariant($"width-dike-{width.Dike}"));
    }

    /// <summary>Lays out a view.</summary>
    public static Figure View(Findings findings, ViewImage view, RunFacts facts) =>
        ViewFigure.Make(view, findings.Intake.Frame.North != North.Model, facts.RunId);

    /// <summary>Makes all sheets at once, writes them below plots/ in their order, and hands them to the report.</summary>
    public static List<DrawnPlot> Write(ResultFolder files, Findings findings, DrawingsRecord drawings, RunFacts facts, StageContext context)
    {
        Figure[] figures = [.. Figures(findings, drawings, facts)];
        var work = new List<Func<byte[]>>();
        foreach (ViewImage view in drawings.Views)
        {
            Figure figure = View(findings, view, facts);
            work.Add(() => FigureFiles.Png(figure, facts.RunId, ViewFigure.PerPoint(view)));
            work.Add(() => FigureFiles.Png(figure, facts.RunId, ScreenPerPoint));
        }

        foreach (Figure figure in figures)
        {
            work.Add(() => FigureFiles.Svg(figure, facts.RunId));
            work.Add(() => FigureFiles.Pdf(figure, facts));
            work.Add(() => FigureFiles.Png(figure, facts.RunId));
        }

        // Each sheet is made from records alone, so who makes which changes no byte.
        byte[][] made = new byte[work.Count][];
        Parallel.For(
            0,
            made.Length,
            new ParallelOptions { MaxDegreeOfParallelism = Math.Max(1, context.Threads), CancellationToken = context.Stop },
            i => made[i] = work[i]());

        var drawn = new List<DrawnPlot>();
        int at = 2 * drawings.Views.Length;
        foreach (Figure figure in figures)
        {
            (byte[] svg, byte[] pdf, byte[] png) = (made[at], made[at + 1], made[at + 2]);
            at += 3;
            files.Write($"plots/{figure.Name}.svg", svg);
            files.Write($"plots/{figure.Name}.pdf", pdf);
            files.Write($"plots/{figure.Name}.png", png);
            drawn.Add(new DrawnPlot(figure.Name, figure.Title, figure.Words, svg, png));
        }

        for (int v = 0; v < drawings.Views.Length; v++)
        {
            ViewImage view = drawings.Views[v];
            files.Write($"plots/{view.Name}.png", made[2 * v]);
            drawn.Add(new DrawnPlot(view.Name, view.Title, view.Sentence, [], made[(2 * v) + 1]));
        }

        return drawn;
    }
}
