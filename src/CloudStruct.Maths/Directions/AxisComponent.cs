using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Directions;

/// <summary>One cluster of a mixture of axes: Bingham's law with a share.</summary>
/// <param name="Share">Part of all weight, 0 to 1.</param>
/// <param name="Mean">Mean axis, unit vector.</param>
/// <param name="Wide">Unit vector square to the mean, along which the cluster is widest.</param>
/// <param name="Narrow">The third unit vector.</param>
/// <param name="KWide">Exponent along <see cref="Wide"/>, at most 0.</param>
/// <param name="KNarrow">Exponent along <see cref="Narrow"/>, at most <see cref="KWide"/>.</param>
/// <param name="LogNormaliser">ln B of <see cref="Bingham"/>.</param>
public readonly record struct AxisComponent(
    double Share, Vec3 Mean, Vec3 Wide, Vec3 Narrow, double KWide, double KNarrow, double LogNormaliser)
{
    // Both exponents beyond this: three terms of the series below are right to 1e-3.
    private const double Tight = 12;

    /// <summary>ln of the density over that of uniform axes.</summary>
    /// <param name="axis">Unit vector of either sign.</param>
    public double LogDensity(Vec3 axis)
    {
        double x = axis.Dot(Wide), y = axis.Dot(Narrow);
        return (KWide * x * x) + (KNarrow * y * y) - LogNormaliser;
    }

    /// <summary>Standard deviation along the wide direction [deg], by the tangent plane.</summary>
    public double SpreadDeg => KWide < 0 ? Math.Min(90, Math.Sqrt(-0.5 / KWide) * 180 / Math.PI) : 90;

    /// <summary>The component whose law has a given orientation tensor (maximum likelihood, or within 1e-3 of it).</summary>
    /// <param name="share">Part of all weight.</param>
    /// <param name="tensor">Eigenvalues with sum 1 and eigenvectors.</param>
    /// <param name="round">True for the same spread in all directions (Watson's law).</param>
    /// <param name="narrowestDeg">Smallest spread allowed [deg]: a few equal axes must not become a spike.</param>
    public static AxisComponent FromTensor(double share, Eigen3 tensor, bool round, double narrowestDeg)
    {
        double floor = Math.Pow(Math.Sin(narrowestDeg * Math.PI / 180), 2);
        double s2 = Math.Max(floor, tensor.L2), s3 = Math.Max(floor, tensor.L3);
        if (round) s2 = s3 = (s2 + s3) / 2;
        (double wide, double narrow) = (-0.5 / s2, -0.5 / s3);
        double logB;
        if (wide < -Tight)
        {
            logB = TightLogNormaliser(-wide, -narrow);
        }
        else
        {
            (narrow, wide) = Bingham.KappasOf(s3, s2, 1e-4);
            logB = Bingham.LogNormaliser(narrow, wide);
        }

        return new AxisComponent(share, tensor.V1, tensor.V2, tensor.V3, wide, narrow, logB);
    }

    /// <summary>ln B for exponents -a and -b, both large: normal in the tangent plane times the moments of 1/√(1 - r²).</summary>
    private static double TightLogNormaliser(double a, double b)
    {
        double r2 = ((1 / a) + (1 / b)) / 2, r4 = (0.75 / (a * a)) + (0.5 / (a * b)) + (0.75 / (b * b));
        return Math.Log((1 + (r2 / 2) + (3 * r4 / 8)) / (2 * Math.Sqrt(a * b)));
    }
}
