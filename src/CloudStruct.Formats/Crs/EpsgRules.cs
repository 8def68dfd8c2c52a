using CloudStruct.Records.Frame;
using static System.FormattableString;

namespace CloudStruct.Formats.Crs;

/// <summary>Coordinate systems by EPSG code alone: the UTM families by rule, some much used grids by their published definitions.</summary>
/// <remarks>Codes and parameters are facts of the EPSG registry; the test compares every one with an open projection
/// library. What is not here runs on grid north.</remarks>
internal static class EpsgRules
{
    private static readonly (int First, int Last, int FirstZone, bool South, string Name, string Datum, string Ellipsoid, double A, double F)[] Utm =
    [
        (32601, 32660, 1, false, "WGS 84", "WGS_1984", "WGS 84", 6378137, 298.257223563),
        (32701, 32760, 1, true, "WGS 84", "WGS_1984", "WGS 84", 6378137, 298.257223563),
        (25828, 25838, 28, false, "ETRS89", "European_Terrestrial_Reference_System_1989", "GRS 1980", 6378137, 298.257222101),
        (26901, 26923, 1, false, "NAD83", "North_American_Datum_1983", "GRS 1980", 6378137, 298.257222101),
        (6330, 6348, 1, false, "NAD83(2011)", "NAD83_National_Spatial_Reference_System_2011", "GRS 1980", 6378137, 298.257222101),
        (26701, 26722, 1, false, "NAD27", "North_American_Datum_1927", "Clarke 1866", 6378206.4, 294.978698213898),
        (23028, 23038, 28, false, "ED50", "European_Datum_1950", "International 1924", 6378388, 297),
        (31965, 31976, 11, false, "SIRGAS 2000", "Sistema_de_Referencia_Geocentrico_para_las_AmericaS_2000", "GRS 1980", 6378137, 298.257222101),
        (31977, 31985, 17, true, "SIRGAS 2000", "Sistema_de_Referencia_Geocentrico_para_las_AmericaS_2000", "GRS 1980", 6378137, 298.257222101),
        (28348, 28358, 48, true, "GDA94", "Geocentric_Datum_of_Australia_1994", "GRS 1980", 6378137, 298.257222101),
        (7846, 7859, 46, true, "GDA2020", "Geocentric_Datum_of_Australia_2020", "GRS 1980", 6378137, 298.257222101),
    ];

    private static readonly (int Code, string Name, string Geographic, string Ellipsoid, double A, double F, string Method, double[] Parameters)[] Grids =
    [
        // Parameters in the order of Names below; NaN where the method has none.
        (3006, "SWEREF99 TM", "SWEREF99", "GRS 1980", 6378137, 298.257222101, Methods.TransverseMercator, [0, 15, double.NaN, double.NaN, 0.9996, 500000, 0]),
        (3067, "ETRS89 / TM35FIN(E,N)", "ETRS89", "GRS 1980", 6378137, 298.257222101, Methods.TransverseMercator, [0, 27, double.NaN, double.NaN, 0.9996, 500000, 0]),
        (2193, "NZGD2000 / New Zealand Transverse Mercator 2000", "NZGD2000", "GRS 1980", 6378137, 298.257222101, Methods.TransverseMercator, [0, 173, double.NaN, double.NaN, 0.9996, 1600000, 10000000]),
        (27700, "OSGB36 / British National Grid", "OSGB36", "Airy 1830", 6377563.396, 299.3249646, Methods.TransverseMercator, [49, -2, double.NaN, double.NaN, 0.9996012717, 400000, -100000]),
        (2180, "ETRF2000-PL / CS92", "ETRF2000-PL", "GRS 1980", 6378137, 298.257222101, Methods.TransverseMercator, [0, 19, double.NaN, double.NaN, 0.9993, 500000, -5300000]),
        (2154, "RGF93 v1 / Lambert-93", "RGF93 v1", "GRS 1980", 6378137, 298.257222101, Methods.LambertConic, [46.5, 3, 49, 44, double.NaN, 700000, 6600000]),
        (3034, "ETRS89-extended / LCC Europe", "ETRS89", "GRS 1980", 6378137, 298.257222101, Methods.LambertConic, [52, 10, 35, 65, double.NaN, 4000000, 2800000]),
        (3057, "ISN93 / Lambert 1993", "ISN93", "GRS 1980", 6378137, 298.257222101, Methods.LambertConic, [65, -19, 64.25, 65.75, double.NaN, 500000, 500000]),
        (5325, "ISN2004 / Lambert 2004", "ISN2004", "GRS 1980", 6378137, 298.257222101, Methods.LambertConic, [65, -19, 64.25, 65.75, double.NaN, 1700000, 300000]),
        (8088, "ISN2016 / Lambert 2016", "ISN2016", "GRS 1980", 6378137, 298.257222101, Methods.LambertConic, [65, -19, 64.25, 65.75, double.NaN, 2700000, 300000]),
        (5070, "NAD83 / Conus Albers", "NAD83", "GRS 1980", 6378137, 298.257222101, Methods.Albers, [23, -96, 29.5, 45.5, double.NaN, 0, 0]),
        (3577, "GDA94 / Australian Albers", "GDA94", "GRS 1980", 6378137, 298.257222101, Methods.Albers, [0, 132, -18, -36, double.NaN, 0, 0]),
        (3413, "WGS 84 / NSIDC Sea Ice Polar Stereographic North", "WGS 84", "WGS 84", 6378137, 298.257223563, Methods.PolarStereographic, [double.NaN, -45, 70, double.NaN, double.NaN, 0, 0]),
        (3995, "WGS 84 / Arctic Polar Stereographic", "WGS 84", "WGS 84", 6378137, 298.257223563, Methods.PolarStereographic, [double.NaN, 0, 71, double.NaN, double.NaN, 0, 0]),
        (3031, "WGS 84 / Antarctic Polar Stereographic", "WGS 84", "WGS 84", 6378137, 298.257223563, Methods.PolarStereographic, [double.NaN, 0, -71, double.NaN, double.NaN, 0, 0]),
        (3395, "WGS 84 / World Mercator", "WGS 84", "WGS 84", 6378137, 298.257223563, Methods.Mercator, [0, 0, double.NaN, double.NaN, 1, 0, 0]),
    ];

    private static readonly string[] Names =
    [
        "latitude_of_origin_deg", "central_meridian_deg", "standard_parallel_1_deg", "standard_parallel_2_deg", "scale_factor",
        "false_easting_m", "false_northing_m",
    ];

    // US State Plane grids in feet: NAD83, NAD83(HARN), NAD27 (EPSG registry; gaps between are other states in the same unit
    // or no codes). Newer realisations are read from their unit key.
    private static readonly (int First, int Last)[] InternationalFeet =
    [
        (2222, 2224), (2251, 2253), (2256, 2256), (2265, 2266), (2269, 2270), (2273, 2273), (2280, 2282), (2867, 2869), (2896, 2898),
        (2901, 2901), (2909, 2910), (2913, 2914), (2921, 2923),
    ];

    private static readonly (int First, int Last)[] SurveyFeet =
    [
        (2225, 2250), (2254, 2255), (2257, 2264), (2267, 2268), (2271, 2272), (2274, 2279), (2283, 2289), (2870, 2895), (2899, 2900),
        (2902, 2908), (2911, 2912), (2915, 2920), (2924, 2930), (26729, 26813), (32001, 32058),
    ];

    /// <summary>A draft of the system; null when the code is not known here.</summary>
    public static CrsDraft? Find(int code)
    {
        foreach (var u in Utm)
        {
            if (code < u.First || code > u.Last) continue;
            int zone = u.FirstZone + code - u.First;
            CrsDraft d = Draft(code, Invariant($"{u.Name} / {(u.Name.StartsWith("GDA", StringComparison.Ordinal) ? "MGA" : "UTM")} zone {zone}{(u.Name.StartsWith("GDA", StringComparison.Ordinal) ? "" : u.South ? "S" : "N")}"),
                u.Name, u.Datum, u.Ellipsoid, u.A, u.F, Methods.TransverseMercator);
            Fill(d, [0, (6 * zone) - 183, double.NaN, double.NaN, 0.9996, 500000, u.South ? 10000000 : 0]);
            return d;
        }
        foreach (var g in Grids)
        {
            if (code != g.Code) continue;
            CrsDraft d = Draft(code, g.Name, g.Geographic, g.Geographic, g.Ellipsoid, g.A, g.F, g.Method);
            Fill(d, g.Parameters);
            return d;
        }
        if (code == 3857) return Draft(code, "WGS 84 / Pseudo-Mercator", "WGS 84", "WGS_1984", "WGS 84", 6378137, 298.257223563, Methods.WebMercator);
        return null;
    }

    /// <summary>Metres per unit of grids that are known to be in feet; null for all others.</summary>
    public static double? FeetOf(int code)
    {
        if (InternationalFeet.Any(r => code >= r.First && code <= r.Last)) return Units.FootM;
        return SurveyFeet.Any(r => code >= r.First && code <= r.Last) ? Units.UsFootM : null;
    }

    /// <summary>Whether a code is of the block that the registry keeps for geographic systems.</summary>
    public static bool IsGeographic(int code) => code is >= 4001 and <= 4399 or >= 4463 and <= 4470 or >= 4555 and <= 4558 or >= 4600 and <= 4999 or 6318 or 6319 or 7843 or 7844;

    private static CrsDraft Draft(int code, string name, string geographic, string datum, string ellipsoid, double a, double f, string method) => new()
    {
        Kind = CrsKind.Projected, Name = name, Epsg = code, GeographicName = geographic, DatumName = datum, EllipsoidName = ellipsoid,
        SemiMajorM = a, InverseFlattening = f, Method = method,
    };

    private static void Fill(CrsDraft draft, double[] values)
    {
        for (int i = 0; i < values.Length; i++)
        {
            if (!double.IsNaN(values[i])) draft.Parameters.Add(new CrsParameter(Names[i], values[i]));
        }
    }
}
