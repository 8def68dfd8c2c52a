using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Directions;

/// <summary>95 % regions of poles: from the covariance of a unit normal to cone, ellipse and rake, with the model's common errors.</summary>
public static class PoleRegions
{
    private const double Degree = Math.PI / 180;

    // Equal steps over half a turn; the integrand is periodic and smooth, so that 64 nodes give ten digits.
    private const int Nodes = 64;

    // Root of the 95 % quantile of chi-square with two degrees of freedom: -2 ln 0.05.
    private static readonly double EllipseFactor = Math.Sqrt(-2 * Math.Log(0.05));

    /// <summary>The region of a pole.</summary>
    /// <param name="normal">Unit normal, either sign.</param>
    /// <param name="poleCovarianceRad2">Covariance of the unit normal by internal errors [rad²]; the part along the normal is ignored.</param>
    /// <param name="reference">Common errors: tilt about both horizontal axes, turn about the vertical.</param>
    /// <returns>Ellipse axes are internal and stand for 95 % of a two-dimensional normal law (2.4477 standard deviations);
    /// the cone is the circle that holds as much. Nothing exceeds 90 deg.</returns>
    public static PoleRegion From(Vec3 normal, Symmetric3 poleCovarianceRad2, ModelReference reference)
    {
        (Vec3 along, Vec3 down) = StrikeAndDip(normal);
        (double s1, double s2, double turn) = Axes(poleCovarianceRad2, along, down);
        (double t1, double t2, _) = Axes(poleCovarianceRad2 + Common(normal, reference), along, down);
        return new PoleRegion
        {
            Cone95Deg = Math.Min(90, Cone95(s1, s2) / Degree),
            Cone95TotalDeg = Math.Min(90, Cone95(t1, t2) / Degree),
            Ellipse95MajorDeg = Math.Min(90, EllipseFactor * s1 / Degree),
            Ellipse95MinorDeg = Math.Min(90, EllipseFactor * s2 / Degree),
            Ellipse95RakeDeg = Azimuth.Wrap180(turn / Degree),
            MajorAxis = (along * Math.Cos(turn)) + (down * Math.Sin(turn)),
        };
    }

    /// <summary>Covariance of a unit normal by the common errors of the model [rad²]: N D Nᵀ, N the cross-product matrix of
    /// the normal, D the variances of the turns about the three axes of the frame.</summary>
    public static Symmetric3 Common(Vec3 normal, ModelReference reference)
    {
        double tilt = reference.TiltSigmaDeg * Degree, azimuth = reference.AzimuthSigmaDeg * Degree;

        // A turn by a small vector t moves n by t x n, so each axis adds the outer product of (axis x n).
        return Symmetric3.Outer(new Vec3(1, 0, 0).Cross(normal), tilt * tilt)
            + Symmetric3.Outer(new Vec3(0, 1, 0).Cross(normal), tilt * tilt)
            + Symmetric3.Outer(new Vec3(0, 0, 1).Cross(normal), azimuth * azimuth);
    }

    /// <summary>Radius of the circle about the middle that holds 95 % of a normal law with the two standard deviations.</summary>
    /// <param name="s1">One standard deviation, any unit.</param>
    /// <param name="s2">The other.</param>
    /// <returns>1.960 times the larger when the smaller is 0, 2.448 times when they are equal; 0 when both are 0.</returns>
    public static double Cone95(double s1, double s2) => Circle(s1, s2, 0.05);

    /// <summary>Radius of the circle about the middle outside of which a given share of a normal law lies.</summary>
    /// <param name="s1">One standard deviation, any unit.</param>
    /// <param name="s2">The other.</param>
    /// <param name="outside">Share outside, 0.001 to 0.999.</param>
    /// <remarks>With x = s1 p cos f, y = s2 p sin f and p² exponential of mean 2, the share outside a circle of radius r is the
    /// mean over f of exp(-r² / (2 (s1² cos² f + s2² sin² f))). Solved by bisection. Agrees with H. L. Harter 1960, Circular
    /// error probabilities, J. Am. Stat. Assoc. 55, 723-731 (table from memory).</remarks>
    public static double Circle(double s1, double s2, double outside)
    {
        double big = Math.Max(s1, s2), small = Math.Min(s1, s2);
        if (!(big > 0)) return 0;
        if (double.IsInfinity(big)) return double.PositiveInfinity;
        double ratio2 = small / big * (small / big), low = 0, high = 4;
        for (int i = 0; i < 50; i++)
        {
            double middle = (low + high) / 2;
            if (ShareOutside(middle * middle, ratio2) > outside) low = middle;
            else high = middle;
        }

        return big * (low + high) / 2;
    }

    /// <summary>Horizontal strike direction (right-hand rule) and steepest direction down, both in the plane.</summary>
    /// <remarks>Same conventions as <see cref="Attitude.FromNormal"/>, level and vertical planes included.</remarks>
    public static (Vec3 Along, Vec3 Down) StrikeAndDip(Vec3 normal)
    {
        Vec3 n = normal.Unit();
        if (n.Z < 0 || (n.Z == 0 && (n.X < 0 || (n.X == 0 && n.Y < 0)))) n = -n;
        double h = Math.Sqrt((n.X * n.X) + (n.Y * n.Y));
        double dx = h == 0 ? 0 : n.X / h, dy = h == 0 ? 1 : n.Y / h;
        return (new Vec3(-dy, dx, 0), new Vec3(dx * n.Z, dy * n.Z, -h));
    }

    private static double ShareOutside(double r2, double ratio2)
    {
        double sum = 0;
        for (int i = 0; i < Nodes; i++)
        {
            double c = Math.Cos(Math.PI * (i + 0.5) / Nodes);
            sum += Math.Exp(-r2 / (2 * ((c * c) + (ratio2 * (1 - (c * c))))));
        }

        return sum / Nodes;
    }

    private static (double S1, double S2, double Turn) Axes(Symmetric3 c, Vec3 along, Vec3 down)
    {
        double a = c.Form(along), d = c.Form(down), b = along.Dot(c.Times(down));
        double middle = (a + d) / 2, half = Math.Sqrt(((a - d) * (a - d) / 4) + (b * b));
        double turn = Math.Atan2(2 * b, a - d) / 2;
        return (Math.Sqrt(Math.Max(0, middle + half)), Math.Sqrt(Math.Max(0, middle - half)), turn);
    }
}
