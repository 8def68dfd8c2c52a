using System.Globalization;
using CloudStruct.Records.Frame;
using static System.FormattableString;

namespace CloudStruct.Formats.Crs;

/// <summary>Coordinate system from well-known text, version 1 or 2, its vertical part split off.</summary>
internal sealed class WktReader
{
    private readonly CrsDraft draft = new();
    private readonly List<string> problems = [];
    private bool isSecond;

    private WktReader()
    {
    }

    /// <summary>Reads a text.</summary>
    /// <exception cref="FormatException">It is not well-known text.</exception>
    public static CrsFound Read(string text)
    {
        var reader = new WktReader();
        foreach (WktNode node in WktText.Parse(text)) reader.Top(node, 0);
        reader.draft.Source = reader.isSecond ? "WKT2" : "WKT1";
        return new CrsFound(reader.draft.Done(), [.. reader.problems]);
    }

    private void Top(WktNode node, int depth)
    {
        if (depth > 8) throw new FormatException("systems nested too deeply");
        switch (node.Keyword)
        {
            case "COMPD_CS" or "COMPOUNDCRS":
                isSecond = node.Keyword == "COMPOUNDCRS";
                foreach (WktNode child in node.Children) Top(child, depth + 1);
                break;
            case "BOUNDCRS":
                isSecond = true;
                if (node.Child("SOURCECRS")?.Children is [WktNode source, ..]) Top(source, depth + 1);
                break;
            case "PROJCS":
                Projected(node);
                break;
            case "PROJCRS" or "PROJECTEDCRS":
                isSecond = true;
                ProjectedSecond(node);
                break;
            case "GEOGCS" or "GEOCCS" or "GEOGCRS" or "GEOGRAPHICCRS" or "GEODCRS" or "GEODETICCRS":
                isSecond |= node.Keyword is not ("GEOGCS" or "GEOCCS");
                Geographic(node);
                break;
            case "LOCAL_CS" or "ENGCRS" or "ENGINEERINGCRS":
                isSecond |= node.Keyword != "LOCAL_CS";
                Local(node);
                break;
            case "VERT_CS" or "VERTCS" or "VERTCRS" or "VERTICALCRS":
                isSecond |= node.Keyword is "VERTCRS" or "VERTICALCRS";
                Vertical(node);
                break;
            default:
                // Elements beside the systems of a compound one (AUTHORITY, ID, SCOPE, ...).
                if (depth == 0) problems.Add(Invariant($"The coordinate system text starts with {node.Keyword}, which is not known; it is ignored."));
                break;
        }
    }

    private void Projected(WktNode node)
    {
        Common(node, CrsKind.Projected);
        if (node.Child("GEOGCS") is WktNode geographic) BaseSystem(geographic);
        double degrees = AngleDegrees(node.Child("GEOGCS")?.Child("UNIT")) ?? 1;
        draft.HorizontalUnitM = LengthM(node.Child("UNIT"), "horizontal") ?? 1;
        draft.Method = Methods.Of(node.Child("PROJECTION")?.Name ?? "");
        foreach (WktNode p in node.Children.Where(c => c.Keyword == "PARAMETER"))
        {
            if (Methods.Parameter(p.Name) is string name && p.Number(1) is double value)
                Add(name, value * (name.EndsWith("_m", StringComparison.Ordinal) ? draft.HorizontalUnitM : name.EndsWith("_deg", StringComparison.Ordinal) ? degrees : 1));
        }
        // Some writers put the vertical system inside the projected one.
        if (node.Child("VERT_CS", "VERTCS") is WktNode vertical) Vertical(vertical);
        draft.Wkt = node.ToText("VERT_CS", "VERTCS", "TOWGS84", "EXTENSION");
        Settle(node);
    }

    private void ProjectedSecond(WktNode node)
    {
        Common(node, CrsKind.Projected);
        if (node.Child("BASEGEODCRS", "BASEGEOGCRS") is WktNode geographic) BaseSystem(geographic);
        double? horizontal = null, vertical = null;
        foreach (WktNode axis in node.Children.Where(c => c.Keyword == "AXIS"))
        {
            double? unit = LengthM(axis.Child("LENGTHUNIT", "UNIT"), "horizontal");
            if (axis.Values.Count > 1 && axis.Values[1].Text.Equals("up", StringComparison.OrdinalIgnoreCase)) vertical = unit;
            else horizontal ??= unit;
        }
        horizontal ??= LengthM(node.Child("LENGTHUNIT", "UNIT"), "horizontal");
        draft.HorizontalUnitM = horizontal ?? 1;
        draft.VerticalUnitM = vertical;
        WktNode? conversion = node.Child("CONVERSION", "DERIVINGCONVERSION");
        draft.Method = Methods.Of(conversion?.Child("METHOD", "PROJECTION")?.Name ?? "");
        foreach (WktNode p in conversion?.Children.Where(c => c.Keyword == "PARAMETER") ?? [])
        {
            if (Methods.Parameter(p.Name) is not string name || p.Number(1) is not double value) continue;
            WktNode? unit = p.Child("LENGTHUNIT", "ANGLEUNIT", "SCALEUNIT", "UNIT");
            if (name.EndsWith("_m", StringComparison.Ordinal)) value *= LengthM(unit, "parameter") ?? draft.HorizontalUnitM;
            else if (name.EndsWith("_deg", StringComparison.Ordinal)) value *= AngleDegrees(unit) ?? 1;
            else value *= unit?.Number(1) ?? 1;
            Add(name, value);
        }
        Settle(node);
    }

    private void Geographic(WktNode node)
    {
        Common(node, CrsKind.Geographic);
        BaseSystem(node);
        if (node.Keyword == "GEOGCS") draft.Wkt = node.ToText("VERT_CS", "VERTCS", "TOWGS84", "EXTENSION");
        WktNode? up = node.Children.FirstOrDefault(c => c.Keyword == "AXIS" && c.Values.Count > 1 && c.Values[1].Text.Equals("up", StringComparison.OrdinalIgnoreCase));
        draft.VerticalUnitM = LengthM(up?.Child("LENGTHUNIT", "UNIT"), "vertical");
        if (node.Child("VERT_CS", "VERTCS") is WktNode vertical) Vertical(vertical);
    }

    private void Local(WktNode node)
    {
        Common(node, CrsKind.Local);
        draft.HorizontalUnitM = LengthM(node.Child("UNIT", "LENGTHUNIT") ?? node.Child("AXIS")?.Child("LENGTHUNIT", "UNIT"), "horizontal") ?? 1;
        if (node.Keyword == "LOCAL_CS") draft.Wkt = node.ToText();
    }

    private void Vertical(WktNode node)
    {
        draft.VerticalName = node.Name;
        draft.VerticalUnitM = LengthM(node.Child("UNIT", "LENGTHUNIT") ?? node.Child("AXIS")?.Child("LENGTHUNIT", "UNIT"), "vertical") ?? draft.VerticalUnitM;
    }

    private void Common(WktNode node, CrsKind kind)
    {
        draft.Kind = kind;
        draft.Name = node.Name;
        draft.Epsg = Epsg(node);
    }

    private void BaseSystem(WktNode node)
    {
        draft.GeographicName = node.Name;
        WktNode? datum = node.Child("DATUM", "GEODETICDATUM", "TRF", "ENSEMBLE");
        draft.DatumName = datum?.Name ?? "unknown";
        if ((datum?.Child("SPHEROID", "ELLIPSOID") ?? node.Child("ELLIPSOID")) is WktNode ellipsoid)
        {
            draft.EllipsoidName = ellipsoid.Name;
            draft.SemiMajorM = (ellipsoid.Number(1) ?? 0) * (LengthM(ellipsoid.Child("LENGTHUNIT", "UNIT"), "ellipsoid") ?? 1);
            draft.InverseFlattening = ellipsoid.Number(2) ?? 0;
        }
        draft.PrimeMeridianDeg = (node.Child("PRIMEM", "PRIMEMERIDIAN")?.Number(1) ?? 0) * (AngleDegrees(node.Child("UNIT", "ANGLEUNIT")) ?? 1);
    }

    // A grid whose axes point south or west has no north along y: its parameters would only mislead.
    private void Settle(WktNode node)
    {
        bool turned = node.Children.Where(c => c.Keyword == "AXIS").Any(a => a.Values.Count > 1 && a.Values[1].Text.ToUpperInvariant() is "SOUTH" or "WEST");
        if (turned && draft.Method != Methods.PolarStereographic)
        {
            draft.Parameters.Clear();
            problems.Add("The grid's axes point south or west; its convergence is not computed.");
        }
        if (draft.Method == Methods.WebMercator)
            problems.Add("Web Mercator stretches lengths by 1/cos(latitude): widths and areas come out too large. Reproject the cloud to UTM or a national grid.");
    }

    private void Add(string name, double value)
    {
        draft.Parameters.RemoveAll(p => p.Name == name);
        draft.Parameters.Add(new CrsParameter(name, value));
    }

    private double? LengthM(WktNode? unit, string which)
    {
        if (unit?.Number(1) is not double factor || !(factor > 0)) return null;
        // "US survey foot" with factor 1 is seen in files: the name is what somebody chose, the factor what nobody filled in.
        if (factor == 1 && Units.MetresOf(unit.Name) is double byName && byName != 1)
        {
            problems.Add(Invariant($"The {which} unit is named {unit.Name} but its factor says metre; the name is followed."));
            return byName;
        }
        // Ten-digit factors of feet are rounded: the exact ones keep kilometres right to the micrometre.
        if (Math.Abs(factor - Units.UsFootM) < 1e-9) return Units.UsFootM;
        return factor;
    }

    private static double? AngleDegrees(WktNode? unit)
    {
        if (unit?.Number(1) is not double radians || !(radians > 0)) return null;
        double degrees = radians * 180 / Math.PI;
        return Math.Abs(degrees - 1) < 1e-9 ? 1 : degrees;
    }

    private static int Epsg(WktNode node)
    {
        foreach (WktNode id in node.Children.Where(c => c.Keyword is "AUTHORITY" or "ID"))
        {
            if (id.Name.Equals("EPSG", StringComparison.OrdinalIgnoreCase) && id.Values.Count > 1
                && int.TryParse(id.Values[1].Text, NumberStyles.None, CultureInfo.InvariantCulture, out int code)) return code;
        }
        return 0;
    }
}
