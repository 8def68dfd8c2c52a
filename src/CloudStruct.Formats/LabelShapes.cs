using CloudStruct.Records.Classes;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Frame;
using NetTopologySuite.Geometries;

namespace CloudStruct.Formats;

/// <summary>Hand labels from geometries with properties, whichever file they came from.</summary>
internal static class LabelShapes
{
    /// <summary>Adds the labels of one feature.</summary>
    /// <param name="where">File and feature, for messages.</param>
    /// <param name="geometry">Polygon, several polygons, or points; null is a fault.</param>
    /// <param name="property">Value of a property as text, empty when there is none.</param>
    /// <param name="number">Value of a property as a number, null when there is none.</param>
    /// <param name="polygons">Receives polygons.</param>
    /// <param name="points">Receives points.</param>
    public static void Add(
        string where, Geometry? geometry, Func<string, string> property, Func<string, double?> number,
        List<LabelPolygon> polygons, List<LabelPoint> points)
    {
        (RockClass Class, LabelUse Use) label = LabelWords.Both(property("class"), property("use"), out string fault);
        if (fault.Length > 0)
            throw new InputException(where, fault, $"class {property("class")}, use {property("use")}", "Correct the property");
        double low = number("z_min_m") ?? double.NegativeInfinity, high = number("z_max_m") ?? double.PositiveInfinity;
        if (!(low <= high)) throw new InputException(where, "z_min_m lies above z_max_m", $"{low} and {high}", "Correct the properties");
        if (geometry == null || geometry.IsEmpty) throw new InputException(where, "the feature has no geometry", "nothing", "Draw it or remove it");
        for (int i = 0; i < geometry.NumGeometries; i++)
        {
            switch (geometry.GetGeometryN(i))
            {
                case Polygon polygon:
                    Vec3[][] rings = [Ring(polygon.ExteriorRing), .. polygon.InteriorRings.Select(Ring)];
                    Check(where, rings.SelectMany(r => r));
                    polygons.Add(new LabelPolygon(rings, low, high, label.Class, label.Use));
                    break;
                case Point point when double.IsFinite(point.Z):
                    var place = new Vec3(point.X, point.Y, point.Z);
                    Check(where, [place]);
                    points.Add(new LabelPoint(place, label.Class, label.Use));
                    break;
                case Geometry other:
                    throw new InputException(where, "a label must be a polygon, or a point with a height", other.GeometryType, "Draw polygons");
            }
        }
    }

    private static Vec3[] Ring(LineString ring) => [.. ring.Coordinates.Select(c => new Vec3(c.X, c.Y, 0))];

    private static void Check(string where, IEnumerable<Vec3> places)
    {
        if (places.Any(p => !double.IsFinite(p.X) || !double.IsFinite(p.Y)))
            throw new InputException(where, "a coordinate is not a number", "NaN or infinity", "Draw the feature again");
    }
}
