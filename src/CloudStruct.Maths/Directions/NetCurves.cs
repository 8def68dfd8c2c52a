using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Directions;

/// <summary>Curves on the net as polylines, cut at the primitive (the circle of radius 1).</summary>
public static class NetCurves
{
    private const double Degree = Math.PI / 180;

    /// <summary>Great circle of a plane: its lines from one end of the strike over the line of dip to the other.</summary>
    /// <param name="normal">Unit normal, either sign. A level plane gives the primitive, a vertical one a straight line.</param>
    /// <param name="turnDeg">Degrees from grid to the stated north.</param>
    /// <param name="steps">Pieces of the polyline.</param>
    public static Point2[] GreatCircle(Vec3 normal, double turnDeg = 0, int steps = 90)
    {
        (Vec3 along, Vec3 down) = PoleRegions.StrikeAndDip(normal);
        var curve = new Point2[steps + 1];
        bool level = Math.Abs(down.Z) < 1e-12;
        for (int i = 0; i <= steps; i++)
        {
            (double s, double c) = Math.SinCos(Math.PI * i / steps * (level ? 2 : 1));
            Vec3 line = (along * c) + (down * s);

            // Rounding may lift an end of the strike above the horizon: 0 keeps it on the primitive.
            curve[i] = EqualAreaNet.Turned(EqualAreaNet.OfDirection(new Vec3(line.X, line.Y, Math.Min(0, line.Z))), turnDeg);
        }

        return curve;
    }

    /// <summary>Small circle about an axis: the edge of its cone. Where it leaves the net it comes in again opposite.</summary>
    /// <param name="axis">Unit vector, either sign.</param>
    /// <param name="halfAngleDeg">0 to 90; at 90 it is the great circle of the plane square to the axis.</param>
    /// <param name="turnDeg">Degrees from grid to the stated north.</param>
    /// <param name="steps">Pieces of the polyline.</param>
    /// <returns>One closed curve (first equals last) or open pieces that end on the primitive.</returns>
    public static IReadOnlyList<Point2[]> SmallCircle(Vec3 axis, double halfAngleDeg, double turnDeg = 0, int steps = 72)
    {
        Vec3 lower = TrendPlunge.Lower(axis);
        (Vec3 e1, Vec3 e2) = Tangent.Axes(lower);
        (double s, double c) = Math.SinCos(halfAngleDeg * Degree);
        var circle = new Vec3[steps];
        for (int i = 0; i < steps; i++)
        {
            (double y, double x) = Math.SinCos(2 * Math.PI * i / steps);
            circle[i] = (lower * c) + (e1 * (s * x)) + (e2 * (s * y));
        }

        return OnNet(circle, turnDeg);
    }

    /// <summary>A closed ring of directions that stand for axes, drawn on the lower hemisphere.</summary>
    private static IReadOnlyList<Point2[]> OnNet(Vec3[] ring, double turnDeg)
    {
        int n = ring.Length, start = Array.FindIndex(ring, v => v.Z > 0);
        bool crosses = start >= 0 && Array.Exists(ring, v => v.Z <= 0);
        var pieces = new List<Point2[]>();
        if (!crosses)
        {
            Point2[] whole = [.. ring.Append(ring[0]).Select(v => Place(v, start >= 0, turnDeg))];
            pieces.Add(whole);
            return pieces;
        }

        // Start where the ring changes side, so that no piece is split at the seam of the array.
        while (ring[start].Z > 0 == ring[(start + n - 1) % n].Z > 0) start = (start + 1) % n;
        var piece = new List<Point2>();
        for (int i = 0; i < n; i++)
        {
            Vec3 before = ring[(start + i + n - 1) % n], here = ring[(start + i) % n];
            bool above = here.Z > 0;
            if (above != before.Z > 0)
            {
                Vec3 rim = Rim(before, here);
                if (piece.Count > 0)
                {
                    piece.Add(Place(rim, !above, turnDeg));
                    pieces.Add([.. piece]);
                    piece.Clear();
                }

                piece.Add(Place(rim, above, turnDeg));
            }

            piece.Add(Place(here, above, turnDeg));
        }

        Vec3 last = ring[(start + n - 1) % n];
        piece.Add(Place(Rim(last, ring[start]), last.Z > 0, turnDeg));
        pieces.Add([.. piece]);
        return pieces;
    }

    private static Vec3 Rim(Vec3 a, Vec3 b)
    {
        Vec3 v = (a * b.Z) - (b * a.Z);
        v = (b.Z - a.Z) < 0 ? -v : v;
        return new Vec3(v.X, v.Y, 0).Unit();
    }

    private static Point2 Place(Vec3 v, bool flip, double turnDeg) =>
        EqualAreaNet.Turned(EqualAreaNet.OfDirection(flip ? -v : v), turnDeg);

    /// <summary>Keeps the parts of a polyline that lie within radius 1, with the points where it crosses.</summary>
    public static IReadOnlyList<Point2[]> CutAtPrimitive(IReadOnlyList<Point2> line)
    {
        var pieces = new List<Point2[]>();
        var piece = new List<Point2>();
        for (int i = 0; i < line.Count; i++)
        {
            Point2 here = line[i];
            bool inside = Inside(here);
            if (i > 0 && inside != Inside(line[i - 1]))
            {
                piece.Add(Crossing(line[i - 1], here));
                if (!inside)
                {
                    pieces.Add([.. piece]);
                    piece.Clear();
                }
            }

            if (inside) piece.Add(here);
        }

        if (piece.Count > 1) pieces.Add([.. piece]);

        // A closed line that was cut: its last piece runs on into its first.
        if (pieces.Count > 1 && line[0] == line[^1] && Inside(line[0]))
        {
            pieces[0] = [.. pieces[^1], .. pieces[0].AsSpan(1)];
            pieces.RemoveAt(pieces.Count - 1);
        }

        return pieces;
    }

    private static bool Inside(Point2 p) => (p.X * p.X) + (p.Y * p.Y) <= 1;

    private static Point2 Crossing(Point2 a, Point2 b)
    {
        // |a + t (b - a)|² = 1 has one root in [0, 1], for one end is inside.
        double dx = b.X - a.X, dy = b.Y - a.Y;
        double q = (dx * dx) + (dy * dy), h = (a.X * dx) + (a.Y * dy), r = (a.X * a.X) + (a.Y * a.Y) - 1;
        double root = Math.Sqrt(Math.Max(0, (h * h) - (q * r))), t = r <= 0 ? (root - h) / q : -(h + root) / q;
        double x = a.X + (t * dx), y = a.Y + (t * dy), length = Math.Sqrt((x * x) + (y * y));
        return new Point2(x / length, y / length);
    }
}
