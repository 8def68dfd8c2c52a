using System.Xml.Linq;
using CloudStruct.Products.Plots;
using CloudStruct.Records.Drawings;
using static CloudStruct.Products.Report.Html;

namespace CloudStruct.Products.Report;

/// <summary>report.html: one page that opens without a network or an installed program.</summary>
/// <remarks>First screen: what was measured, the numbers that matter with their limits, what is doubtful. Then the strip
/// along chainage of each dike, from which the rest hangs. A script links the views; what it shows stands in the page without
/// it too, for paper, for readers of text, and where the program was built without Node.js.</remarks>
/// <param name="findings">Every stage's record.</param>
/// <param name="drawings">What the sheets need computed.</param>
/// <param name="facts">About the run.</param>
/// <param name="plots">Pictures.</param>
/// <param name="assets">Script and style of the linked page; null where the program was built without them.</param>
internal sealed partial class ReportPage(Findings findings, DrawingsRecord drawings, RunFacts facts, IReadOnlyList<DrawnPlot> plots, PageAssets? assets)
{
    /// <summary>The page as UTF-8.</summary>
    public byte[] Bytes() => Page(El("html", At("lang", "en"), Head(), Body()));

    private XElement Head() => El("head",
        El("meta", At("charset", "utf-8")),
        El("meta", At("name", "viewport"), At("content", "width=device-width, initial-scale=1")),
        // Nothing may be fetched, whatever a later change puts on the page.
        El("meta", At("http-equiv", "Content-Security-Policy"), At("content",
            "default-src 'none'; img-src data:; style-src 'unsafe-inline'" + (assets == null ? "" : $"; script-src '{assets.ScriptHash}'"))),
        El("title", Clean($"{Name()}: dike and fractures")),
        El("style", RawText.Style(Style)), assets == null ? null : El("style", RawText.Style(assets.Style)));

    private string Name() => Clean(findings.SurveyName.Length > 0 ? findings.SurveyName : "Survey");

    private XElement Body() => El("body",
        El("a", At("class", "skip"), At("href", "#strip"), "Skip to the strip along chainage"),
        El("header",
            El("p", At("class", "kicker"), $"CloudStruct {facts.ToolVersion} · run {facts.RunId}", facts.InputDate is { } d ? $" · data of {d:yyyy-MM-dd}" : null),
            El("h1", Name()),
            Measured()),
        El("main",
            Numbers(),
            Doubts(),
            Strips(),
            Bench(),
            Contents(),
            Dikes(),
            Faces(),
            SetsAndNets(),
            Decided(),
            Views(),
            Surface(),
            Evidence(),
            Run(),
            Cautions()),
        Carried());

    private XElement Contents() => El("nav", At("aria-label", "Sections"), El("ul",
        El("li", Link("#dikes", "Dikes")), El("li", Link("#faces", "Faces")), El("li", Link("#sets", "Sets and nets")),
        El("li", Link("#views", "Map and views")), El("li", Link("#classes", "Classes")), El("li", Link("#evidence", "Evidence")),
        El("li", Link("#run", "This run")), El("li", Link("#cautions", "Cautions"))));

    private XElement Section(string id, string title, params object?[] content) =>
        El("section", At("id", id), At("aria-labelledby", id + "-title"), El("h2", At("id", id + "-title"), title), content);

    private XElement Plot(DrawnPlot plot)
    {
        bool photograph = plot.Svg.Length == 0 || IsMap(plot);
        string data = photograph ? PagePicture.OfPhotograph(plot.Png) : PagePicture.OfDrawing(plot.Svg, plot.Png);
        string[] kinds = plot.Svg.Length > 0 ? ["svg", "pdf", "png"] : ["png"];
        return El("figure", At("class", photograph ? "wide" : "column"),
            El("img", At("src", data), At("decoding", "async"), At("alt", Clean($"{plot.Title}. {plot.Words}"))),
            El("figcaption", "Files: ", kinds.Select((k, i) => new object[] { i > 0 ? ", " : "", Link($"plots/{plot.Name}.{k}", k.ToUpperInvariant()) })));
    }

    private static bool IsMap(DrawnPlot plot) => plot.Name.StartsWith("map", StringComparison.Ordinal);
}
