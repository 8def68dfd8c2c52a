namespace CloudStruct.Formats.Crs;

/// <summary>Projection methods and parameters: the many spellings of texts and keys, and our one name for each.</summary>
/// <remarks>Names of OGC 01-009, of the EPSG methods 9801-9829 in ISO 19162, and the older spellings seen in files
/// (common practice).</remarks>
internal static class Methods
{
    /// <summary>Transverse Mercator.</summary>
    public const string TransverseMercator = "Transverse Mercator";

    /// <summary>Lambert conformal conic, one or two standard parallels.</summary>
    public const string LambertConic = "Lambert Conformal Conic";

    /// <summary>Albers equal-area conic.</summary>
    public const string Albers = "Albers Equal Area";

    /// <summary>Polar stereographic.</summary>
    public const string PolarStereographic = "Polar Stereographic";

    /// <summary>Mercator.</summary>
    public const string Mercator = "Mercator";

    /// <summary>Mercator on a sphere with ellipsoidal latitudes: the web-map grid.</summary>
    public const string WebMercator = "Web Mercator";

    /// <summary>Our name of a method; the name as written when it is none of ours.</summary>
    public static string Of(string name) => Plain(name) switch
    {
        "transverse_mercator" or "gauss_kruger" or "transverse_mercator_complex" => TransverseMercator,
        "lambert_conformal_conic" or "lambert_conformal_conic_1sp" or "lambert_conformal_conic_2sp" or "lambert_conic_conformal_1sp"
            or "lambert_conic_conformal_2sp" => LambertConic,
        "albers" or "albers_conic_equal_area" or "albers_equal_area" or "albers_equal_area_conic" => Albers,
        "polar_stereographic" or "polar_stereographic_variant_a" or "polar_stereographic_variant_b" or "stereographic_north_pole"
            or "stereographic_south_pole" => PolarStereographic,
        "mercator" or "mercator_1sp" or "mercator_2sp" or "mercator_variant_a" or "mercator_variant_b" => Mercator,
        "popular_visualisation_pseudo_mercator" or "mercator_auxiliary_sphere" or "google_mercator" => WebMercator,
        _ => name.Replace('_', ' '),
    };

    /// <summary>Our name of a parameter; null for those that convergence and composed text do not need.</summary>
    public static string? Parameter(string name) => Plain(name) switch
    {
        "latitude_of_origin" or "latitude_of_natural_origin" or "latitude_of_false_origin" or "latitude_of_center" or "latitude_of_centre" => "latitude_of_origin_deg",
        "central_meridian" or "longitude_of_natural_origin" or "longitude_of_origin" or "longitude_of_false_origin" or "longitude_of_center"
            or "longitude_of_centre" or "straight_vertical_longitude_from_pole" => "central_meridian_deg",
        "scale_factor" or "scale_factor_at_natural_origin" => "scale_factor",
        "false_easting" or "easting_at_false_origin" => "false_easting_m",
        "false_northing" or "northing_at_false_origin" => "false_northing_m",
        "standard_parallel_1" or "latitude_of_1st_standard_parallel" or "latitude_of_standard_parallel" => "standard_parallel_1_deg",
        "standard_parallel_2" or "latitude_of_2nd_standard_parallel" => "standard_parallel_2_deg",
        _ => null,
    };

    // "Lambert Conic Conformal (2SP)" and "Lambert_Conic_Conformal_2SP" become one.
    private static string Plain(string name)
    {
        var plain = new System.Text.StringBuilder();
        foreach (char c in name)
        {
            if (char.IsLetterOrDigit(c)) plain.Append(char.ToLowerInvariant(c));
            else if (plain.Length > 0 && plain[^1] != '_') plain.Append('_');
        }
        return plain.ToString().TrimEnd('_');
    }
}
