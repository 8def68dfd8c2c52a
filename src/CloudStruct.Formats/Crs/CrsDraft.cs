using CloudStruct.Records.Frame;

namespace CloudStruct.Formats.Crs;

/// <summary>A coordinate system while it is being put together from text, keys or a code.</summary>
internal sealed class CrsDraft
{
    /// <summary>Projected, geographic, local.</summary>
    public CrsKind Kind { get; set; }

    /// <summary>Name of the horizontal system.</summary>
    public string Name { get; set; } = "";

    /// <summary>EPSG code; 0 when not stated.</summary>
    public int Epsg { get; set; }

    /// <summary>Name of the vertical system.</summary>
    public string VerticalName { get; set; } = "";

    /// <summary>Metres per horizontal unit.</summary>
    public double HorizontalUnitM { get; set; } = 1;

    /// <summary>Metres per vertical unit; null: as horizontal.</summary>
    public double? VerticalUnitM { get; set; }

    /// <summary>Where it came from.</summary>
    public string Source { get; set; } = "none";

    /// <summary>Projection method.</summary>
    public string Method { get; set; } = "";

    /// <summary>Parameters in degrees and metres.</summary>
    public List<CrsParameter> Parameters { get; } = [];

    /// <summary>Name of the geographic system below a projected one.</summary>
    public string GeographicName { get; set; } = "unknown";

    /// <summary>Datum name.</summary>
    public string DatumName { get; set; } = "unknown";

    /// <summary>Ellipsoid name.</summary>
    public string EllipsoidName { get; set; } = "unknown";

    /// <summary>Semi-major axis [m]; 0 when unknown.</summary>
    public double SemiMajorM { get; set; }

    /// <summary>Inverse flattening; 0 for a sphere.</summary>
    public double InverseFlattening { get; set; }

    /// <summary>Prime meridian [deg east of Greenwich].</summary>
    public double PrimeMeridianDeg { get; set; }

    /// <summary>WKT1 text as found; empty: composed when possible.</summary>
    public string Wkt { get; set; } = "";

    /// <summary>The finished record.</summary>
    public CrsInfo Done() => new()
    {
        Kind = Kind, Name = Name, Epsg = Epsg, VerticalName = VerticalName, HorizontalUnitM = HorizontalUnitM,
        VerticalUnitM = VerticalUnitM ?? HorizontalUnitM, Source = Source, Method = Method, Parameters = [.. Parameters],
        SemiMajorM = SemiMajorM, InverseFlattening = InverseFlattening, Wkt = Wkt.Length > 0 ? Wkt : Wkt1Text.Compose(this),
    };
}
