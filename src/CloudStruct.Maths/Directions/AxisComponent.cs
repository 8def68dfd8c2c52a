using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Directions;

/// <summary>One cluster of a mixture of axes: Bingham's law with a share, or Watson's when it is round.</summary>
/// <param name="Share">Part of all weight, 0 to 1.</param>
/// <param name="Mean">Mean axis, unit vector.</param>
/// <param name="Wide">Unit vector square to the mean, along which the cluster is widest.</param>
/// <param name="Narrow">The third unit vector.</param>
/// <param name="KWide">Exponent along <see cref="Wide"/>, at most 0.</param>
/// <param name="KNarrow">Exponent along <see cref="Narrow"/>, at most <see cref="KWide"/>.</param>
/// <param name="LogNormaliser">ln B of <see cref="Bingham"/>.</param>
/// <param name="Round">True when the law is Watson's: one exponent for all directions.</param>
public readonly record struct AxisComponent(
    double Share, Vec3 Mean, Vec3 Wide, Vec3 Narrow, double KWide, double KNarrow, double LogNormaliser, bool Round)
{
    // Both exponents beyond this: three terms of the series below are right to 1e-3.
    private const double Tight = 12;

    /// <summary>Free parameters: share, two of the mean, and one (round) or three of the shape.</summary>
    public int Parameters => Round ? 4 : 6;

    /// <summary>Standard deviation along the wide direction [deg], by the tangent plane.</summary>
    public double SpreadDeg => KWide < 0 ? Math.Min(90, Math.Sqrt(-0.5 / KWide) * 180 / Math.PI) : 90;

    /// <summary>ln of the density over that of uniform axes.</summary>
    /// <param name="axis">Unit vector of either sign.</param>
    public double LogDensity(Vec3 axis)
    {
        double x = axis.Dot(Wide), y = axis.Dot(Narrow);
        return (KWide * x * x) + (KNarrow * y * y) - LogNormaliser;
    }

    /// <summary>The component whose law has a given orientation tensor (maximum likelihood, or within 1e-3 of it).</summary>
    /// <param name="share">Part of all weight.</param>
    /// <param name="tensor">Eigenvalues with sum 1 and eigenvectors.</param>
    /// <param name="round">True for the same spread in all directions (Watson's law).</param>
    /// <param name="narrowestDeg">Smallest spread allowed [deg]: a few equal axes must not become a spike.</param>
    public static AxisComponent FromTensor(double share, Eigen3 tensor, bool round, double narrowestDeg)
    {
        double floor = Math.Pow(Math.Sin(narrowestDeg * Math.PI / 180), 2);
        double s2 = Math.Max(floor, tensor.L2), s3 = Math.Max(floor, tensor.L3), wide, narrow, logB;
        if (round)
        {
            s2 = s3 = (s2 + s3) / 2;
            wide = narrow = -WatsonKappa(s2);
            logB = Watson.LogNormaliser(-wide) + wide;
        }
        else if (s2 < 0.5 / Tight)
        {
            (wide, narrow) = (-0.5 / s2, -0.5 / s3);
            logB = TightLogNormaliser(-wide, -narrow);
        }
        else
        {
            (narrow, wide) = Bingham.KappasOf(s3, s2, 1e-3);
            logB = Bingham.LogNormaliser(narrow, wide);
        }

        return new AxisComponent(share, tensor.V1, tensor.V2, tensor.V3, wide, narrow, logB, round);
    }

    /// <summary>Watson's κ whose law has the mean square component s in every direction square to the mean.</summary>
    /// <remarks>Newton's rule from the normal approximation 1/(2s), with 1/κ as the unknown, in which the law is nearly linear:
    /// three rounds give six digits up to a spread of 30 deg. Bisection as in <see cref="Watson.KappaOf"/> costs fifty.</remarks>
    private static double WatsonKappa(double s)
    {
        double target = 1 - (2 * s), kappa = Math.Max(0.05, (0.5 / s) - 0.5);
        if (target <= 0.4) return Watson.KappaOf(Math.Max(0.34, target));
        for (int i = 0; i < 3; i++)
        {
            double f = Watson.MeanCosineSquared(kappa) - target, step = 1e-4 * kappa;
            double slope = (Watson.MeanCosineSquared(kappa + step) - Watson.MeanCosineSquared(kappa)) / step;
            double move = f / slope;   // in κ; turned into a move of 1/κ so that it cannot cross zero
            kappa = 1 / Math.Max(1e-6, (1 / kappa) + (move / (kappa * kappa)));
        }

        return kappa;
    }

    /// <summary>ln B for exponents -a and -b, both large: normal in the tangent plane times the moments of 1/√(1 - r²).</summary>
    private static double TightLogNormaliser(double a, double b)
    {
        double r2 = ((1 / a) + (1 / b)) / 2, r4 = (0.75 / (a * a)) + (0.5 / (a * b)) + (0.75 / (b * b));
        return Math.Log((1 + (r2 / 2) + (3 * r4 / 8)) / (2 * Math.Sqrt(a * b)));
    }
}
