using System.Xml.Linq;
using static CloudStruct.Products.Report.Html;

namespace CloudStruct.Products.Report;

internal sealed partial class ReportPage
{
    // Where the script puts the linked views.
    private XElement Bench() => assets == null
        ? El("p", At("class", "nothing"), At("id", "bench"), "This report carries pictures only: Node.js was missing when the program was built, so the linked views (poles, map, three dimensions, cross-sections, decisions) could not be put in.")
        : El("section", At("id", "bench"), At("class", "bench"), At("aria-labelledby", "bench-title"),
            El("h2", At("id", "bench-title"), "Look closer"), El("p", At("class", "plain"), "The linked views need a browser that runs scripts. The tables and pictures below show the same."));

    private object?[] Carried()
    {
        if (assets == null) return [];
        PackedCloud? cloud = PackedCloud.Of(drawings.Cloud, drawings.Faces);
        return
        [
            El("script", At("type", "application/octet-stream"), At("id", "page-data"), PageData.Text(findings, drawings, facts, cloud)),
            El("script", At("type", "application/octet-stream"), At("id", "page-cloud"), cloud?.Text() ?? ""),
            El("script", RawText.Script(assets.Script)),
        ];
    }
}
