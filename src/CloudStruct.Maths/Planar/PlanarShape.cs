using CloudStruct.Records.Drawings;
using NetTopologySuite.Geometries;
using NetTopologySuite.Geometries.Utilities;
using NetTopologySuite.Triangulate.Polygon;

namespace CloudStruct.Maths.Planar;

/// <summary>A ring in the plane made valid, and cut into triangles.</summary>
/// <param name="Ring">Counter-clockwise, not closed; empty when nothing of the ring encloses an area.</param>
/// <param name="Triangles">Three vertices each, counter-clockwise, together covering the ring exactly once.</param>
public sealed record PlanarShape(Point2[] Ring, int[] Triangles)
{
    /// <summary>Nothing.</summary>
    public static PlanarShape Empty { get; } = new([], []);

    /// <summary>Mends a ring and cuts it.</summary>
    /// <param name="ring">Not closed, either sense; may touch or cross itself. Of several parts the largest is kept; holes
    /// that mending leaves are dropped, because an outline has none.</param>
    public static PlanarShape Of(ReadOnlySpan<Point2> ring)
    {
        if (ring.Length < 3) return Empty;
        var corners = new Coordinate[ring.Length + 1];
        for (int i = 0; i < ring.Length; i++) corners[i] = new Coordinate(ring[i].X, ring[i].Y);
        corners[^1] = corners[0].Copy();
        var factory = GeometryFactory.Default;
        Geometry given = factory.CreatePolygon(corners);
        if (!given.IsValid) given = GeometryFixer.Fix(given);
        Polygon? largest = null;
        for (int i = 0; i < given.NumGeometries; i++)
        {
            if (given.GetGeometryN(i) is Polygon { IsEmpty: false } p && (largest is null || p.Area > largest.Area)) largest = p;
        }

        if (largest is null || !(largest.Area > 0)) return Empty;
        Coordinate[] closed = largest.ExteriorRing.Coordinates;
        if (!NetTopologySuite.Algorithm.Orientation.IsCCW(closed)) Array.Reverse(closed);
        var mended = new Point2[closed.Length - 1];
        var at = new Dictionary<Coordinate, int>(mended.Length);
        for (int i = 0; i < mended.Length; i++)
        {
            mended[i] = new Point2(closed[i].X, closed[i].Y);
            at[closed[i]] = i;
        }

        return new PlanarShape(mended, Cut(factory.CreatePolygon(closed), at));
    }

    private static int[] Cut(Polygon polygon, Dictionary<Coordinate, int> at)
    {
        Geometry cut = new PolygonTriangulator(polygon).GetResult();
        var triangles = new List<int>(3 * cut.NumGeometries);
        for (int i = 0; i < cut.NumGeometries; i++)
        {
            Coordinate[] t = cut.GetGeometryN(i).Coordinates;
            if (!at.TryGetValue(t[0], out int a) || !at.TryGetValue(t[1], out int b) || !at.TryGetValue(t[2], out int c)) continue;
            bool left = ((t[1].X - t[0].X) * (t[2].Y - t[0].Y)) - ((t[1].Y - t[0].Y) * (t[2].X - t[0].X)) > 0;
            triangles.AddRange(left ? [a, b, c] : [a, c, b]);
        }

        return [.. triangles];
    }
}
