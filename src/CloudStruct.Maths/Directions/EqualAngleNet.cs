using CloudStruct.Records.Drawings;

namespace CloudStruct.Maths.Directions;

/// <summary>The stereographic projection of the sphere of directions from straight up onto the lower hemisphere, primitive radius 1.</summary>
/// <remarks>J. P. Snyder 1987, USGS Prof. Paper 1395, eq. 21-1 (from memory): r = tan(c/2), c the angle from straight down.</remarks>
public static class EqualAngleNet
{
    /// <summary>Where a place on <see cref="EqualAreaNet"/> lies on this net: same azimuth, tan(c/2) instead of √2 sin(c/2).</summary>
    /// <param name="p">Radius at most 1, or slightly more.</param>
    public static Point2 OfEqualArea(Point2 p)
    {
        double half = ((p.X * p.X) + (p.Y * p.Y)) / 2, k = 1 / Math.Sqrt(2 * (1 - Math.Min(half, 0.999)));
        return new Point2(p.X * k, p.Y * k);
    }
}
