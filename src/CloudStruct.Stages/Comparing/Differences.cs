using CloudStruct.Maths.Directions;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Comparing;
using CloudStruct.Records.Frame;
using MathNet.Numerics.Statistics;

namespace CloudStruct.Stages.Comparing;

/// <summary>Differences of attitudes and widths against their stated regions.</summary>
internal static class Differences
{
    /// <summary>Root of the 95 % quantile of chi-square with two degrees of freedom.</summary>
    public const double EllipseFactor = 2.447747;

    private const double Degree = Math.PI / 180;

    /// <summary>Tables give angles to 0.01 deg: standard deviation of what the rounding of strike and dip adds [deg].</summary>
    private const double RoundingDeg = 0.01 / 3.4641;

    /// <summary>Medians of the normalised difference where regions are true, in one and in two dimensions.</summary>
    private static readonly double TrueMedian1 = 0.674490, TrueMedian2 = Math.Sqrt(2 * Math.Log(2));

    /// <summary>Mahalanobis distance of two poles, in the plane that touches the sphere at the first, by both internal ellipses.</summary>
    public static double Normalised(MeasuredPlane a, MeasuredPlane b)
    {
        Symmetric3 c = Covariance(a) + Covariance(b);
        (Vec3 along, Vec3 down) = PoleRegions.StrikeAndDip(a.Normal);
        Vec3 other = b.Normal.Dot(a.Normal) < 0 ? -b.Normal : b.Normal;
        (double u, double v) = (other.Dot(along), other.Dot(down));
        double aa = c.Form(along), bb = c.Form(down), ab = along.Dot(c.Times(down)), det = (aa * bb) - (ab * ab);
        return Math.Sqrt(Math.Max(0, ((bb * u * u) - (2 * ab * u * v) + (aa * v * v)) / det));
    }

    /// <summary>Standard deviation of a difference of two poles in one direction, on average [rad].</summary>
    public static double Sigma(MeasuredPlane a, MeasuredPlane b) => Math.Sqrt((Variance(a) + Variance(b)) / 2);

    /// <summary>Angle between two axes [deg].</summary>
    public static double AngleDeg(Vec3 a, Vec3 b) => Math.Atan2(a.Cross(b).Length, Math.Abs(a.Dot(b))) / Degree;

    /// <summary>Pairs of one kind counted.</summary>
    /// <param name="name">Which they are.</param>
    /// <param name="pairs">Those that count.</param>
    public static ComparedGroup? Group(string name, IEnumerable<ComparedPair> pairs)
    {
        ComparedPair[] own = [.. pairs.Where(p => p.Counts)];
        if (own.Length == 0) return null;
        bool widths = own[0].Kind == "width";
        double share = own.Average(p => p.Within95 ? 1.0 : 0);
        (double low, double high) = Wilson(share, own.Length);
        return new ComparedGroup(
            name, own[0].Kind, own.Length, share, low, high, Statistics.Median(own.Select(p => p.Normalised)) / (widths ? TrueMedian1 : TrueMedian2),
            Statistics.Median(own.Select(p => widths ? Math.Abs(p.WidthDifferenceM) : p.RestDeg)));
    }

    /// <summary>95 % interval of a share (E. B. Wilson 1927, J. Am. Stat. Assoc. 22, 209-212).</summary>
    public static (double Low, double High) Wilson(double share, int n)
    {
        const double z = 1.959964;
        double middle = (share + (z * z / (2 * n))) / (1 + (z * z / n));
        double half = z / (1 + (z * z / n)) * Math.Sqrt((share * (1 - share) / n) + (z * z / (4.0 * n * n)));
        return (Math.Max(0, middle - half), Math.Min(1, middle + half));
    }

    /// <summary>Steps of a sample's distribution.</summary>
    public static ShareCurve Found(string label, IEnumerable<double> values)
    {
        double[] sorted = [.. values.Order()];
        return new ShareCurve(label, false, sorted, [.. sorted.Select((_, i) => (i + 1.0) / sorted.Length)]);
    }

    /// <summary>The turn that a rotation vector says, in words of a map.</summary>
    public static RotationFound? InWords(CommonRotation? found)
    {
        if (found is null) return null;
        double azimuth = -found.Vector.Z / Degree, half = found.HalfWidth(Vec3.Up) / Degree;
        var level = new Vec3(found.Vector.X, found.Vector.Y, 0);
        double tilt = level.Length;
        Vec3 axis = tilt > 1e-12 ? level * (1 / tilt) : new Vec3(1, 0, 0);
        double halfTilt = found.HalfWidth(axis);
        // Turned about a level axis, the top moves to the right of ... the axis: axis x up.
        Vec3 toward = axis.Cross(Vec3.Up);
        return new RotationFound(
            azimuth, azimuth - half, azimuth + half, tilt / Degree, Math.Max(0, tilt - halfTilt) / Degree, (tilt + halfTilt) / Degree,
            (Math.Atan2(toward.X, toward.Y) / Degree + 360) % 360, found.Pairs);
    }

    private static Symmetric3 Covariance(MeasuredPlane p)
    {
        (Vec3 along, Vec3 down) = PoleRegions.StrikeAndDip(p.Normal);
        (double s, double c) = Math.SinCos(p.RakeDeg * Degree);
        Vec3 major = (along * c) + (down * s), minor = (down * c) - (along * s);
        double s1 = p.MajorDeg * Degree / EllipseFactor, s2 = p.MinorDeg * Degree / EllipseFactor, rounding = RoundingDeg * Degree;
        return Symmetric3.Outer(major, (s1 * s1) + (rounding * rounding)) + Symmetric3.Outer(minor, (s2 * s2) + (rounding * rounding));
    }

    private static double Variance(MeasuredPlane p)
    {
        double s1 = p.MajorDeg * Degree / EllipseFactor, s2 = p.MinorDeg * Degree / EllipseFactor, rounding = RoundingDeg * Degree;
        return (s1 * s1) + (s2 * s2) + (2 * rounding * rounding);
    }
}
