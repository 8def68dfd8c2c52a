using CloudStruct.Records.Complaints;
using CloudStruct.Records.Frame;
using NetTopologySuite.Geometries;
using static System.FormattableString;

namespace CloudStruct.Formats.GeoJson;

/// <summary>One line drawn in a GeoJSON file.</summary>
internal static class GeoJsonLine
{
    /// <summary>Its vertices in order; z is 0 where the file has none.</summary>
    /// <exception cref="InputException">The file holds no line, several, or one without length.</exception>
    public static Vec3[] Read(string path)
    {
        string name = Path.GetFileName(path);
        Geometry[] shapes = [.. GeoJsonFile.Read(path).Select(f => f.Geometry).Where(g => g is { IsEmpty: false })];
        if (shapes.Length != 1 || shapes[0].NumGeometries != 1 || shapes[0].GetGeometryN(0) is not LineString line)
            throw new InputException(name, "exactly one line was expected", Invariant($"{shapes.Length} feature(s), first {(shapes.Length > 0 ? shapes[0].GeometryType : "none")}"),
                "Draw one line along the dike, from where chainage shall start");
        Vec3[] places = [.. line.Coordinates.Select(c => new Vec3(c.X, c.Y, double.IsFinite(c.Z) ? c.Z : 0))];
        if (places.Any(p => !double.IsFinite(p.X) || !double.IsFinite(p.Y)))
            throw new InputException(name, "a coordinate of the line is not a number", "NaN or infinity", "Draw the line again");
        if (!(line.Length > 0)) throw new InputException(name, "the line has no length", Invariant($"{places.Length} vertices"), "Draw the line again");
        return places;
    }
}
