using System.Globalization;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Sets;
using NetTopologySuite.Features;
using NetTopologySuite.Geometries;
using static System.FormattableString;

namespace CloudStruct.Formats.GeoJson;

/// <summary>Zones drawn as polygons in a GeoJSON file.</summary>
internal static class GeoJsonZones
{
    /// <summary>All zones of a file in order; a feature of several polygons is one zone.</summary>
    /// <exception cref="InputException">A feature is no polygon, or a coordinate is no number.</exception>
    public static Zone[] Read(string path)
    {
        var zones = new List<Zone>();
        IFeature[] features = [.. GeoJsonFile.Read(path)];
        for (int n = 1; n <= features.Length; n++)
        {
            IFeature feature = features[n - 1];
            string where = Invariant($"{Path.GetFileName(path)}, feature {n}");
            if (feature.Geometry is not { IsEmpty: false } shape) throw new InputException(where, "the zone has no geometry", "nothing", "Draw it or remove it");
            var rings = new List<Vec3[]>();
            for (int i = 0; i < shape.NumGeometries; i++)
            {
                if (shape.GetGeometryN(i) is not Polygon polygon)
                    throw new InputException(where, "a zone must be a polygon", shape.GetGeometryN(i).GeometryType, "Draw polygons");
                rings.AddRange([Ring(polygon.ExteriorRing), .. polygon.InteriorRings.Select(Ring)]);
            }

            if (rings.SelectMany(r => r).Any(p => !double.IsFinite(p.X) || !double.IsFinite(p.Y)))
                throw new InputException(where, "a coordinate is not a number", "NaN or infinity", "Draw the zone again");
            string plain = Path.GetFileNameWithoutExtension(path);
            zones.Add(new Zone(Named(feature, "name") ?? Named(feature, "zone") ?? (features.Length == 1 ? plain : Invariant($"{plain} {n}")), [.. rings]));
        }

        return [.. zones];
    }

    private static string? Named(IFeature feature, string property) =>
        feature.Attributes?.GetOptionalValue(property) is { } v && Convert.ToString(v, CultureInfo.InvariantCulture) is { Length: > 0 } text ? text : null;

    private static Vec3[] Ring(LineString ring) => [.. ring.Coordinates.Select(c => new Vec3(c.X, c.Y, 0))];
}
