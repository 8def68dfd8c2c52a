using System.Globalization;
using CloudStruct.Records.Frame;

namespace CloudStruct.Simulate;

/// <summary>Where an invented outcrop lies: in open water, so that nobody's rock is meant.</summary>
/// <param name="Crs">Coordinate system of its map.</param>
/// <param name="Origin">Map coordinates of its middle.</param>
public sealed record InventedSite(CrsInfo Crs, Vec3 Origin)
{
    /// <summary>West of the central meridian of UTM zone 32N: map north lies about two degrees west of true north.</summary>
    public static InventedSite North { get; } = new(Utm(32, false), new(341_870, 6_231_460, 0));

    /// <summary>East of the central meridian of UTM zone 21S, with a large northing.</summary>
    public static InventedSite South { get; } = new(Utm(21, true), new(688_240, 4_418_900, 0));

    /// <summary>A zone of UTM on WGS 84. Values of the ellipsoid and the zone are those of the EPSG dataset (from memory).</summary>
    private static CrsInfo Utm(int zone, bool south)
    {
        int epsg = (south ? 32700 : 32600) + zone, meridian = (6 * zone) - 183, northing = south ? 10_000_000 : 0;
        string name = $"WGS 84 / UTM zone {zone.ToString(CultureInfo.InvariantCulture)}{(south ? "S" : "N")}";
        return new CrsInfo
        {
            Kind = CrsKind.Projected,
            Name = name,
            Epsg = epsg,
            Source = "WKT1",
            Method = "Transverse Mercator",
            Parameters =
            [
                new("latitude_of_origin_deg", 0),
                new("central_meridian_deg", meridian),
                new("scale_factor", 0.9996),
                new("false_easting_m", 500_000),
                new("false_northing_m", northing),
            ],
            SemiMajorM = 6_378_137,
            InverseFlattening = 298.257223563,
            Wkt = string.Create(CultureInfo.InvariantCulture, $"""
                PROJCS["{name}",GEOGCS["WGS 84",DATUM["WGS_1984",SPHEROID["WGS 84",6378137,298.257223563,AUTHORITY["EPSG","7030"]],AUTHORITY["EPSG","6326"]],PRIMEM["Greenwich",0,AUTHORITY["EPSG","8901"]],UNIT["degree",0.0174532925199433,AUTHORITY["EPSG","9122"]],AUTHORITY["EPSG","4326"]],PROJECTION["Transverse_Mercator"],PARAMETER["latitude_of_origin",0],PARAMETER["central_meridian",{meridian}],PARAMETER["scale_factor",0.9996],PARAMETER["false_easting",500000],PARAMETER["false_northing",{northing}],UNIT["metre",1,AUTHORITY["EPSG","9001"]],AXIS["Easting",EAST],AXIS["Northing",NORTH],AUTHORITY["EPSG","{epsg}"]]
                """),
        };
    }
}
