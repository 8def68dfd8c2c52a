using System.Xml.Linq;
using CloudStruct.Records.Contacts;
using static System.FormattableString;
using static CloudStruct.Products.Report.Html;

namespace CloudStruct.Products.Report;

internal sealed partial class ReportPage
{
    // One strip a dike; where there is none, the place of the strip says so.
    private XElement Strips()
    {
        int[] dikes = [.. findings.Contacts.Dikes.Select(d => d.Dike).Concat(findings.Width.Stations.Select(s => s.Dike)).Concat(findings.Contacts.Contacts.Select(c => c.Dike)).Distinct().Order()];
        XElement?[] strips = [.. dikes.Select(OneStrip)];
        return El("div", At("id", "strip"), dikes.Length > 0 ? strips : El("section", At("class", "strip"), At("aria-labelledby", "strip-none"),
            El("h2", At("id", "strip-none"), "Along chainage"),
            El("p", "No dike was found, so there is no strip along chainage. What follows are the fracture faces and their sets.")));
    }

    private XElement? OneStrip(int dike)
    {
        var strip = new ChainageStrip(
            dike,
            [.. findings.Width.Stations.Where(s => s.Dike == dike)],
            [.. findings.Contacts.Contacts.Where(c => c.Dike == dike)],
            [.. drawings.Chainage.Where(c => c.Dike == dike)],
            c => "#" + RowId(c.Dike, c.Margin.ToString(), c.Segment));
        string toward = FrameWords.Toward(findings, dike), id = Invariant($"strip-{dike}");
        bool lower = findings.Contacts.Dikes.FirstOrDefault(d => d.Dike == dike)?.AIsLower == true;
        string facing = Facing(dike);
        return El("section", At("class", "strip"), At("aria-labelledby", id),
            El("h2", At("id", id), Invariant($"Dike {dike} along chainage")),
            El("p", Clean($"Chainage increases {toward}. Looking that way, margin A is {(lower ? "the lower side" : "on the left")} and B {(lower ? "the upper" : "on the right")}{facing}. "
                + "The band is the 95 % range. Hatched: a margin is hidden and no width is given. Each bar of evidence leads to its row among the contacts.")),
            strip.IsEmpty ? El("p", "Nothing along this dike could be measured.")
                : El("div", At("class", "scroll"), At("tabindex", "0"), At("role", "region"), At("aria-label", Invariant($"Strip of dike {dike}")), strip.Svg()));
    }

    private string Facing(int dike)
    {
        string Of(Margin m) => findings.Contacts.Contacts.FirstOrDefault(c => c.Dike == dike && c.Margin == m && c.MarginFacing.Length > 0)?.MarginFacing ?? "";
        string a = Of(Margin.A), b = Of(Margin.B);
        return a.Length > 0 && b.Length > 0 ? $" (A faces {a}, B faces {b})" : "";
    }
}
