using System.Globalization;
using System.Text;
using CloudStruct.Records.Frame;

namespace CloudStruct.Formats.Crs;

/// <summary>Composes WKT1 (OGC 01-009), the text that LAS 1.4 asks for, from a drafted system.</summary>
internal static class Wkt1Text
{
    /// <summary>The text; empty when the system is not projected or its method or ellipsoid is not known.</summary>
    public static string Compose(CrsDraft d)
    {
        if (d.Kind == CrsKind.Geographic && d.SemiMajorM > 0) return Geographic(d, d.Name, d.Epsg);
        if (d.Kind != CrsKind.Projected || d.SemiMajorM <= 0 || d.Parameters.Count == 0) return "";
        string method = d.Method switch
        {
            Methods.TransverseMercator => "Transverse_Mercator",
            Methods.LambertConic => Has(d, "standard_parallel_2_deg") ? "Lambert_Conformal_Conic_2SP" : "Lambert_Conformal_Conic_1SP",
            Methods.Albers => "Albers_Conic_Equal_Area",
            Methods.PolarStereographic => "Polar_Stereographic",
            Methods.Mercator => Has(d, "standard_parallel_1_deg") ? "Mercator_2SP" : "Mercator_1SP",
            _ => "",
        };
        if (method.Length == 0) return "";
        var text = new StringBuilder("PROJCS[").Append(Quoted(d.Name.Length > 0 ? d.Name : "unnamed")).Append(',');
        text.Append(Geographic(d, d.GeographicName, 0)).Append(",PROJECTION[").Append(Quoted(method)).Append(']');
        foreach (CrsParameter p in Ordered(d)) text.Append(",PARAMETER[").Append(Quoted(NameOf(p.Name, d.Method))).Append(',').Append(Number(ValueOf(p, d))).Append(']');
        text.Append(",UNIT[").Append(Quoted(UnitName(d.HorizontalUnitM))).Append(',').Append(Number(d.HorizontalUnitM)).Append(']');
        if (d.Epsg > 0) text.Append(",AUTHORITY[\"EPSG\",").Append(Quoted(d.Epsg.ToString(CultureInfo.InvariantCulture))).Append(']');
        return text.Append(']').ToString();
    }

    private static string Geographic(CrsDraft d, string name, int epsg) =>
        $"GEOGCS[{Quoted(name.Length > 0 ? name : "unnamed")},DATUM[{Quoted(d.DatumName)},SPHEROID[{Quoted(d.EllipsoidName)},{Number(d.SemiMajorM)},{Number(d.InverseFlattening)}]],"
        + $"PRIMEM[{Quoted(d.PrimeMeridianDeg == 0 ? "Greenwich" : "other")},{Number(d.PrimeMeridianDeg)}],UNIT[\"degree\",0.0174532925199433]"
        + (epsg > 0 ? $",AUTHORITY[\"EPSG\",{Quoted(epsg.ToString(CultureInfo.InvariantCulture))}]]" : "]");

    private static bool Has(CrsDraft d, string parameter) => d.Parameters.Any(p => p.Name == parameter);

    // The order in which texts commonly give them; readers go by name.
    private static IEnumerable<CrsParameter> Ordered(CrsDraft d)
    {
        string[] order = ["latitude_of_origin_deg", "central_meridian_deg", "standard_parallel_1_deg", "standard_parallel_2_deg", "scale_factor",
            "false_easting_m", "false_northing_m"];
        return d.Parameters.Where(p => Array.IndexOf(order, p.Name) >= 0).OrderBy(p => Array.IndexOf(order, p.Name));
    }

    // WKT1 gives the latitude of true scale of a polar stereographic grid as its latitude of origin.
    private static string NameOf(string parameter, string method) => (parameter, method) switch
    {
        ("standard_parallel_1_deg", Methods.PolarStereographic) => "latitude_of_origin",
        ("latitude_of_origin_deg", Methods.Albers) => "latitude_of_center",
        ("central_meridian_deg", Methods.Albers) => "longitude_of_center",
        _ when parameter.EndsWith("_deg", StringComparison.Ordinal) => parameter[..^4],
        _ when parameter.EndsWith("_m", StringComparison.Ordinal) => parameter[..^2],
        _ => parameter,
    };

    private static double ValueOf(CrsParameter p, CrsDraft d) =>
        p.Name is "false_easting_m" or "false_northing_m" ? p.Value / d.HorizontalUnitM : p.Value;

    private static string UnitName(double metres) => metres switch
    {
        1 => "metre",
        Units.FootM => "foot",
        _ when Math.Abs(metres - Units.UsFootM) < 1e-12 => "US survey foot",
        _ => "unit",
    };

    private static string Quoted(string text) => "\"" + text.Replace("\"", "\"\"", StringComparison.Ordinal) + "\"";

    private static string Number(double v) => v.ToString("R", CultureInfo.InvariantCulture);
}
