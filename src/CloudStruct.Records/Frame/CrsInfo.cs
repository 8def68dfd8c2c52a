namespace CloudStruct.Records.Frame;

/// <summary>A coordinate reference system as read from a file or from survey.yaml, its vertical part split off.</summary>
public sealed record CrsInfo
{
    /// <summary>Nothing stated.</summary>
    public static CrsInfo None { get; } = new();

    /// <summary>Projected, geographic, local or unknown.</summary>
    public CrsKind Kind { get; init; }

    /// <summary>Name as written in the file, for example "WGS 84 / UTM zone 32N"; empty when unknown.</summary>
    public string Name { get; init; } = "";

    /// <summary>EPSG code of the horizontal part; 0 when not stated.</summary>
    public int Epsg { get; init; }

    /// <summary>Name of the vertical part; empty when none.</summary>
    public string VerticalName { get; init; } = "";

    /// <summary>Metres per unit of x and y: 1, 0.3048 (international foot), 1200/3937 (US survey foot).</summary>
    public double HorizontalUnitM { get; init; } = 1;

    /// <summary>Metres per unit of z; equals the horizontal unit when nothing else is stated.</summary>
    public double VerticalUnitM { get; init; } = 1;

    /// <summary>Where it came from: "WKT1", "WKT2", "GeoTIFF keys", "survey.yaml", or "none".</summary>
    public string Source { get; init; } = "none";

    /// <summary>Projection method in plain words ("Transverse Mercator"); empty when unknown.</summary>
    public string Method { get; init; } = "";

    /// <summary>Projection parameters by plain name (latitude_of_origin_deg, central_meridian_deg, scale_factor,
    /// false_easting_m, false_northing_m, standard_parallel_1_deg, standard_parallel_2_deg), in degrees and metres.</summary>
    public CrsParameter[] Parameters { get; init; } = [];

    /// <summary>Semi-major axis of the ellipsoid [m]; 0 when unknown.</summary>
    public double SemiMajorM { get; init; }

    /// <summary>Inverse flattening; 0 for a sphere.</summary>
    public double InverseFlattening { get; init; }

    /// <summary>WKT text as found or composed, without the vertical part; empty when none can be given.</summary>
    public string Wkt { get; init; } = "";
}
