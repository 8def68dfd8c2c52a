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
        foreach (WidthDrawing width in drawings.Widths)
            yield return WidthFigure.Make(width, FrameWords.Toward(findings, width.Dike), facts.RunId, Invariant($"width-dike-{width.Dike}"));
    }

    /// <summary>Lays out a view.</summary>
    public static Figure View(Findings findings, ViewImage view, RunFacts facts) =>
        ViewFigure.Make(view, findings.Intake.Frame.North != North.Model, facts.RunId);

    /// <summary>Writes all below plots/, and hands them to the report.</summary>
    public static List<DrawnPlot> Write(ResultFolder files, Findings findings, DrawingsRecord drawings, RunFacts facts, StageContext context)
    {
        var drawn = new List<DrawnPlot>();
        foreach (Figure figure in Figures(findings, drawings, facts))
        {
            context.Stop.ThrowIfCancellationRequested();
            var plot = new DrawnPlot(figure.Name, figure.Title, figure.Words, FigureFiles.Svg(figure, facts.RunId), FigureFiles.Png(figure, facts.RunId));
            files.Write($"plots/{plot.Name}.svg", plot.Svg);
            files.Write($"plots/{plot.Name}.pdf", FigureFiles.Pdf(figure, facts));
            files.Write($"plots/{plot.Name}.png", plot.Png);
            drawn.Add(plot);
        }
        foreach (ViewImage view in drawings.Views)
        {
            context.Stop.ThrowIfCancellationRequested();
            Figure figure = View(findings, view, facts);
            files.Write($"plots/{view.Name}.png", FigureFiles.Png(figure, facts.RunId, ViewFigure.PerPoint(view)));
            drawn.Add(new(view.Name, view.Title, view.Sentence, [], FigureFiles.Png(figure, facts.RunId, ScreenPerPoint)));
        }
        return drawn;
    }
}
