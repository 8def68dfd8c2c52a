using System.Xml.Linq;
using CloudStruct.Products.Plots;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Width;
using static System.FormattableString;

namespace CloudStruct.Products.Report;

internal sealed partial class ChainageStrip
{
    private string HatchId => Invariant($"hidden-{dike}");

    private XElement Hatching() => new(Svg0 + "defs", new XElement(Svg0 + "pattern", A("id", HatchId), A("width", "7"), A("height", "7"),
        A("patternUnits", "userSpaceOnUse"), A("patternTransform", "rotate(45)"),
        Rect(0, 0, 7, 7, A("fill", "#f4f2ee")), Rect(0, 0, 1.4, 7, A("fill", "#9a958c"))));

    private IEnumerable<XElement> HiddenBoxes(NiceScale along) =>
        from s in stretches
        where s.Status is not (StationStatus.Measured or StationStatus.Unconstrained)
        let x = X(along, s.FromM)
        select Rect(x, WidthTop, X(along, s.ToM) - x, WidthHeight, A("fill", Invariant($"url(#{HatchId})")),
            Tip(Invariant($"chainage {s.FromM:F1} to {s.ToM:F1} m: {Words(s.Status)}")));

    private IEnumerable<XElement> WidthRow(NiceScale along, NiceScale across)
    {
        yield return Text(8, WidthTop + 12, "start", "true width");
        yield return Text(8, WidthTop + 28, "start", "m");
        foreach (double tick in across.Ticks())
        {
            double y = Y(across, tick, WidthTop, WidthHeight);
            yield return Line(Left, y, Right, y, "#d8d3c9", 1);
            yield return Text(Left - 8, y + 4.5, "end", across.Label(tick));
        }
        foreach (Stretch s in stretches)
        {
            WidthPoint[] band = [.. s.Points.Where(p => p is { Low95M: not null, High95M: not null })];
            (double X, double Y) At(WidthPoint p, double v) => (X(along, p.ChainageM), Y(across, v, WidthTop, WidthHeight));
            if (band.Length > 1)
                yield return Path([.. band.Select(p => At(p, p.High95M!.Value)), .. band.Reverse().Select(p => At(p, p.Low95M!.Value))], true, A("fill", "#a6cbe3"));
            else if (band.Length == 1)
                yield return Path([At(band[0], band[0].Low95M!.Value), At(band[0], band[0].High95M!.Value)], false, A("stroke", "#a6cbe3"), A("stroke-width", "6"), A("fill", "none"));
            WidthPoint[] known = [.. s.Points.Where(p => p.WidthM != null)];
            if (known.Length > 1)
                yield return Path(known.Select(p => At(p, p.WidthM!.Value)), false, A("stroke", "#0072b2"), A("stroke-width", "2.2"), A("fill", "none"));
            foreach (XElement mark in Marks(s, At)) yield return mark;
        }
    }

    private IEnumerable<XElement> Marks(Stretch s, Func<WidthPoint, double, (double X, double Y)> at)
    {
        foreach (WidthPoint p in s.Points)
        {
            if (p.WidthM is { } w)
            {
                var (x, y) = at(p, w);
                string limits = p is { Low95M: { } low, High95M: { } high } ? Invariant($" (95 %: {low:F2} to {high:F2} m)") : "";
                yield return new XElement(Svg0 + "circle", A("cx", N(x)), A("cy", N(y)), A("r", stations.Length > 150 ? "1.6" : "3"), A("fill", "#0072b2"),
                    Tip(Invariant($"chainage {p.ChainageM:F1} m: {w:F2} m") + limits));
            }
            else if (p.ApparentM is { } apparent)
            {
                var (x, y) = at(p, apparent);
                yield return new XElement(Svg0 + "circle", A("cx", N(x)), A("cy", N(y)), A("r", stations.Length > 150 ? "2" : "3.5"), A("fill", "#fff"), A("stroke", "#1a1a1a"),
                    A("stroke-width", "1.4"), Tip(Invariant($"chainage {p.ChainageM:F1} m: apparent width {apparent:F2} m, dip not known")));
            }
            else if (p.VisibleM is { } visible)
            {
                var (x, y) = at(p, visible);
                yield return Path([(x - 3, y), (x + 3, y), (x, y), (x, y - 7), (x - 2.5, y - 4), (x, y - 8), (x + 2.5, y - 4)], false,
                    A("stroke", "#1a1a1a"), A("stroke-width", "1.3"), A("fill", "none"), Tip(Invariant($"chainage {p.ChainageM:F1} m: at least {visible:F2} m, a margin is hidden")));
            }
        }
    }

    private IEnumerable<XElement> LeanRow(NiceScale along, NiceScale lean)
    {
        yield return Text(8, LeanTop + 12, "start", "lean to B");
        yield return Text(8, LeanTop + 28, "start", "deg");
        foreach (double tick in lean.Ticks())
        {
            double y = Y(lean, tick, LeanTop, LeanHeight);
            yield return Line(Left, y, Right, y, tick == 0 ? "#8a857c" : "#d8d3c9", 1);
            yield return Text(Left - 8, y + 4.5, "end", lean.Label(tick));
        }
        foreach (Contact c in contacts)
        {
            if (c.LeanToBDeg is not { } value || !double.IsFinite(value)) continue;
            bool a = c.Margin == Margin.A;
            double x1 = X(along, c.ChainageFromM), x2 = X(along, c.ChainageToM), y = Y(lean, value, LeanTop, LeanHeight), middle = ((x1 + x2) / 2) + (a ? -3 : 3);
            string colour = a ? "#0072b2" : "#b34700", limits = "";
            if (c is { LeanLow95Deg: { } low, LeanHigh95Deg: { } high } && double.IsFinite(low) && double.IsFinite(high))
            {
                yield return Line(middle, Y(lean, low, LeanTop, LeanHeight), middle, Y(lean, high, LeanTop, LeanHeight), colour, 1.4);
                limits = Invariant($" (95 %: {low:F1} to {high:F1})");
            }
            XElement bar = Line(x1, y, x2, y, colour, 3.2);
            if (!a) bar.Add(A("stroke-dasharray", "7 3"));
            bar.Add(Tip(Invariant($"margin {c.Margin}, chainage {c.ChainageFromM:F1} to {c.ChainageToM:F1} m: {value:F1} deg") + limits));
            yield return bar;
        }
    }

    private IEnumerable<XElement> Lanes(NiceScale along)
    {
        (string Name, StationStatus Own)[] margins = [("A", StationStatus.AHidden), ("B", StationStatus.BHidden)];
        for (int lane = 0; lane < margins.Length; lane++)
        {
            double y = LaneTop + (lane * LaneStep);
            yield return Text(Left - 8, y + 11, "end", margins[lane].Name + " seen");
            foreach (Stretch s in stretches)
            {
                bool hidden = s.Status == margins[lane].Own || s.Status == StationStatus.BothHidden;
                double x = X(along, s.FromM);
                yield return Rect(x, y, X(along, s.ToM) - x, LaneHeight, A("fill", hidden ? Invariant($"url(#{HatchId})") : "#595959"), A("shape-rendering", "crispEdges"),
                    Tip(Invariant($"margin {margins[lane].Name}, chainage {s.FromM:F1} to {s.ToM:F1} m: {(hidden ? "hidden" : "seen")}")));
            }
        }
    }

    private IEnumerable<XElement> ShareRows(NiceScale along)
    {
        for (int r = 0; r < shares.Length; r++)
        {
            ShareRow row = shares[r];
            double top = ShareTop + (r * ShareStep);
            yield return Text(8, top + 12, "start", row.Name);
            yield return Text(8, top + 28, "start", row.Unit);
            yield return Text(Left - 8, top + 11, "end", row.Top);
            yield return Line(Left, top, Right, top, "#d8d3c9", 1);
            yield return Line(Left, top + ShareHeight, Right, top + ShareHeight, "#8a857c", 1);
            foreach ((double from, double to, double share, string tip) in row.Bars)
            {
                double x = X(along, from), height = ShareHeight * Math.Clamp(share, 0, 1);
                if (height > 0.3) yield return Rect(x, top + ShareHeight - height, X(along, to) - x + 0.4, height, A("fill", row.Colour), A("shape-rendering", "crispEdges"), Tip(tip));
            }
        }
    }

    // Filled where strike and dip are fixed, open where only a direction is.
    private IEnumerable<XElement> EvidenceLanes(NiceScale along)
    {
        foreach (Contact c in contacts)
        {
            double y = EvidenceY(c.Margin, c.Segment - 1), x = X(along, c.ChainageFromM) + 0.75, width = X(along, c.ChainageToM) - x - 0.75;
            bool plane = c.Constraint == Constraint.Plane, a = c.Margin == Margin.A;
            string evidence = c.Evidence switch { Evidence.Surface => "surface", Evidence.Trace => "trace", Evidence.BothMargins => "both", _ => "prior" };
            string fixes = plane ? c.Region is { } r && double.IsFinite(r.Cone95Deg) ? Invariant($"plane, 95 % cone {r.Cone95Deg:F1} deg") : "plane" : "a direction only";
            XElement bar = Rect(x, y, width, LaneHeight, A("fill", plane ? (a ? "#0072b2" : "#b34700") : "#ffffff"), A("stroke", a ? "#0072b2" : "#b34700"));
            if (!plane) bar.Add(A("stroke-dasharray", "4 2"));
            string label = Invariant($"margin {c.Margin}, chainage {c.ChainageFromM:F1} to {c.ChainageToM:F1} m, evidence {evidence}: {fixes}");
            var link = new XElement(Svg0 + "a", A("href", rowOf(c)), A("aria-label", label), bar, Tip(label));
            if (width > 7 * evidence.Length)
            {
                XElement text = Text(x + (width / 2), y + 10.5, "middle", plane ? evidence : evidence + " (line)");
                if (plane) text.SetAttributeValue("fill", "#ffffff");
                text.SetAttributeValue("font-size", "11");
                if (plane || width > 7 * (evidence.Length + 7)) link.Add(text);
            }
            yield return link;
        }
        foreach (Margin m in new[] { Margin.A, Margin.B })
            yield return Text(Left - 8, EvidenceY(m, 0) + 11, "end", m + " evidence");
    }

    private double EvidenceY(Margin margin, int place) =>
        EvidenceTop + ((margin == Margin.A ? place % linesA : linesA + (place % linesB)) * LaneStep);

    private IEnumerable<XElement> Axis(NiceScale along)
    {
        yield return Line(Left, AxisTop - 8, Right, AxisTop - 8, "#1a1a1a", 1.2);
        foreach (double tick in along.Ticks())
        {
            double x = X(along, tick);
            yield return Line(x, AxisTop - 8, x, AxisTop - 2, "#1a1a1a", 1.2);
            yield return Text(x, AxisTop + 12, "middle", along.Label(tick));
        }
        yield return Text((Left + Right) / 2, AxisTop + 32, "middle", "chainage (m)");
    }

    private static string Words(StationStatus status) => status switch
    {
        StationStatus.AHidden => "margin A is hidden",
        StationStatus.BHidden => "margin B is hidden",
        _ => "both margins are hidden",
    };
}
