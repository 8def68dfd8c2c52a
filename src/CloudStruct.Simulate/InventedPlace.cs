using CloudStruct.Records.Frame;

namespace CloudStruct.Simulate;

/// <summary>Where the invented outcrops lie: UTM zone 32N on WGS 84, in open water, so that nobody's rock is meant.</summary>
public static class InventedPlace
{
    /// <summary>WGS 84 / UTM zone 32N. Values of the ellipsoid and the zone are those of the EPSG dataset (from memory).</summary>
    public static CrsInfo Crs { get; } = new()
    {
        Kind = CrsKind.Projected,
        Name = "WGS 84 / UTM zone 32N",
        Epsg = 32632,
        Source = "WKT1",
        Method = "Transverse Mercator",
        Parameters =
        [
            new("latitude_of_origin_deg", 0),
            new("central_meridian_deg", 9),
            new("scale_factor", 0.9996),
            new("false_easting_m", 500_000),
            new("false_northing_m", 0),
        ],
        SemiMajorM = 6_378_137,
        InverseFlattening = 298.257223563,
        Wkt = """
            PROJCS["WGS 84 / UTM zone 32N",GEOGCS["WGS 84",DATUM["WGS_1984",SPHEROID["WGS 84",6378137,298.257223563,AUTHORITY["EPSG","7030"]],AUTHORITY["EPSG","6326"]],PRIMEM["Greenwich",0,AUTHORITY["EPSG","8901"]],UNIT["degree",0.0174532925199433,AUTHORITY["EPSG","9122"]],AUTHORITY["EPSG","4326"]],PROJECTION["Transverse_Mercator"],PARAMETER["latitude_of_origin",0],PARAMETER["central_meridian",9],PARAMETER["scale_factor",0.9996],PARAMETER["false_easting",500000],PARAMETER["false_northing",0],UNIT["metre",1,AUTHORITY["EPSG","9001"]],AXIS["Easting",EAST],AXIS["Northing",NORTH],AUTHORITY["EPSG","32632"]]
            """,
    };
}
