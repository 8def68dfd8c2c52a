using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Directions;

/// <summary>Lambert's azimuthal equal-area projection of the sphere of directions, looked at from above onto the lower
/// hemisphere: straight down is the middle, the horizon is the circle of radius 1, x is east and y is north.</summary>
/// <remarks>J. P. Snyder 1987, Map Projections: A Working Manual, USGS Prof. Paper 1395, eq. 24-3: r = √2 sin(c/2), c the angle
/// from straight down. Written without angles: with a unit vector v that is (x, y) / √(1 - z), so nothing is lost near the
/// middle or the rim.</remarks>
public static class EqualAreaNet
{
    /// <summary>Place of a direction; the upper hemisphere falls between radius 1 and √2.</summary>
    /// <param name="v">Unit vector. Straight up has no place: infinite or NaN.</param>
    public static Point2 OfDirection(Vec3 v)
    {
        double k = 1 / Math.Sqrt(1 - v.Z);
        return new Point2(v.X * k, v.Y * k);
    }

    /// <summary>Place of an axis (a pole or a line): its lower end, radius at most 1.</summary>
    /// <param name="v">Unit vector of either sign.</param>
    /// <param name="turnDeg">Degrees from grid to the stated north: the place turns clockwise by them.</param>
    public static Point2 OfAxis(Vec3 v, double turnDeg = 0)
    {
        Point2 p = OfDirection(TrendPlunge.Lower(v));
        return turnDeg == 0 ? p : Turned(p, turnDeg);
    }

    /// <summary>Direction that a place stands for.</summary>
    /// <param name="p">Radius at most √2.</param>
    /// <returns>Unit vector; z ≤ 0 within radius 1.</returns>
    public static Vec3 Direction(Point2 p)
    {
        double r2 = (p.X * p.X) + (p.Y * p.Y), k = Math.Sqrt(Math.Max(0, 2 - r2));
        return new Vec3(p.X * k, p.Y * k, r2 - 1);
    }

    /// <summary>A place turned clockwise about the middle.</summary>
    public static Point2 Turned(Point2 p, double turnDeg)
    {
        (double s, double c) = Math.SinCos(turnDeg * Math.PI / 180);
        return new Point2((p.X * c) + (p.Y * s), (p.Y * c) - (p.X * s));
    }
}
