using System.Xml.Linq;
using CloudStruct.Products.Plots;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Width;
using static System.FormattableString;

namespace CloudStruct.Products.Report;

/// <summary>The spine of the report: everything that is known along one dike, row below row over one axis of chainage.</summary>
/// <param name="dike">Number of the dike.</param>
/// <param name="stations">Its stations in order of chainage.</param>
/// <param name="contacts">Its contact windows.</param>
/// <param name="cells">Cover, inclusions and density along it.</param>
/// <param name="rowOf">Where the bar of a window leads.</param>
internal sealed partial class ChainageStrip(int dike, Station[] stations, Contact[] contacts, ChainageCell[] cells, Func<Contact, string> rowOf)
{
    // User units; the page scales the whole to its width.
    private const double Width = 1080, Left = 132, Right = 1068, WidthTop = 16, WidthHeight = 150, LeanTop = 190, LeanHeight = 84,
        LaneTop = 292, LaneHeight = 13, LaneStep = 19, ShareHeight = 30, ShareStep = 40, ShareTop = LaneTop + (2 * LaneStep) + 8;

    private static readonly XNamespace Svg0 = "http://www.w3.org/2000/svg";

    private readonly List<Stretch> stretches = Stretch.Of([.. stations.Select(s => new WidthPoint(
        s.ChainageM, s.TrueWidthM, s.TrueWidthLow95M, s.TrueWidthHigh95M, s.Status == StationStatus.Unconstrained ? s.ApparentWidthM : null, s.VisibleWidthM, s.Status))]);

    // Windows may overlap: then neighbours take turns on two lines, or their bars would hide each other.
    private readonly int linesA = LinesFor(contacts, Margin.A), linesB = LinesFor(contacts, Margin.B);

    // One row each: inclusions where there are any, cover, density. Rows that know nothing are left out.
    private readonly ShareRow[] shares = ShareRow.Of(cells);

    private double EvidenceTop => ShareTop + (shares.Length * ShareStep) + (shares.Length > 0 ? 4 : 0);

    private double AxisTop => EvidenceTop + ((linesA + linesB) * LaneStep) + 10;

    /// <summary>True when there is nothing to draw.</summary>
    public bool IsEmpty => stations.Length == 0 && contacts.Length == 0;

    /// <summary>The strip as an inline drawing.</summary>
    public XElement Svg()
    {
        NiceScale along = Along(), across = Across(), lean = Lean();
        var svg = new XElement(Svg0 + "svg", A("viewBox", Invariant($"0 0 {Width} {AxisTop + 40}")), A("role", "group"), A("font-size", "13"),
            A("data-dike", Invariant($"{dike}")), A("data-left", N(Left)), A("data-right", N(Right)), A("data-bottom", N(AxisTop - 8)),
            A("data-from", Invariant($"{along.From:0.####}")), A("data-to", Invariant($"{along.To:0.####}")),
            new XElement(Svg0 + "title", Invariant($"Width, lean, visibility and evidence along dike {dike}")), Hatching());
        svg.Add(HiddenBoxes(along), WidthRow(along, across), LeanRow(along, lean), Lanes(along), ShareRows(along), EvidenceLanes(along), Axis(along));
        return svg;
    }

    private static int LinesFor(Contact[] all, Margin margin)
    {
        Contact[] own = [.. all.Where(c => c.Margin == margin).OrderBy(c => c.ChainageFromM)];
        return own.Zip(own.Skip(1)).Any(p => p.Second.ChainageFromM < p.First.ChainageToM - 1e-6) ? 2 : 1;
    }

    private NiceScale Along()
    {
        double[] all = [.. stretches.SelectMany(s => new[] { s.FromM, s.ToM }), .. contacts.SelectMany(c => new[] { c.ChainageFromM, c.ChainageToM })];
        return NiceScale.Over(all.Min(), all.Max(), 12, false);
    }

    private NiceScale Across()
    {
        double[] shown = [.. stretches.SelectMany(s => s.Points).SelectMany(p => (double?[])[p.WidthM, p.High95M, p.ApparentM, p.VisibleM])
            .Where(v => v is { } x && double.IsFinite(x)).Select(v => v!.Value)];
        return NiceScale.Over(0, shown.Length == 0 ? 1 : shown.Max() * 1.02, 5, true);
    }

    private NiceScale Lean()
    {
        double[] shown = [0, .. contacts.SelectMany(c => (double?[])[c.LeanToBDeg, c.LeanLow95Deg, c.LeanHigh95Deg])
            .Where(v => v is { } x && double.IsFinite(x)).Select(v => Math.Clamp(v!.Value, -90, 90))];
        return NiceScale.Over(Math.Min(-1, shown.Min()), Math.Max(1, shown.Max()), 4, true);
    }

    private static double X(NiceScale along, double chainage) => Left + ((Right - Left) * Math.Clamp(along.At(chainage), 0, 1));

    private static double Y(NiceScale scale, double value, double top, double height) => top + height - (height * Math.Clamp(scale.At(value), 0, 1));

    private static XAttribute A(string name, string value) => new(name, value);

    private static XElement Line(double x1, double y1, double x2, double y2, string stroke, double width) => new(Svg0 + "line",
        A("x1", N(x1)), A("y1", N(y1)), A("x2", N(x2)), A("y2", N(y2)), A("stroke", stroke), A("stroke-width", N(width)));

    private static XElement Rect(double x, double y, double width, double height, params object?[] more) => new(Svg0 + "rect",
        A("x", N(x)), A("y", N(y)), A("width", N(Math.Max(0.5, width))), A("height", N(Math.Max(0.5, height))), more);

    private static XElement Text(double x, double y, string anchor, string text) => new(Svg0 + "text",
        A("x", N(x)), A("y", N(y)), A("text-anchor", anchor), A("fill", "#1a1a1a"), text);

    private static XElement Path(IEnumerable<(double X, double Y)> points, bool close, params object?[] more) => new(Svg0 + "path",
        A("d", string.Concat(points.Select((p, i) => (i == 0 ? "M" : "L") + N(p.X) + " " + N(p.Y))) + (close ? "Z" : "")), more);

    private static XElement Tip(string text) => new(Svg0 + "title", text);

    private static string N(double v) => Invariant($"{v:0.##}");
}
