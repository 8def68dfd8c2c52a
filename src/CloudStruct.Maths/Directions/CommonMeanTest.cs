using CloudStruct.Records.Frame;
using MathNet.Numerics.Distributions;

namespace CloudStruct.Maths.Directions;

/// <summary>Do two mean axes, each with its own variance, agree?</summary>
/// <param name="AngleDeg">Angle between them [deg], 0 to 90.</param>
/// <param name="V">Watson's statistic, about chi-square with 2 degrees of freedom when both variances are known.</param>
/// <param name="P">Probability of a larger V when the means are one, the variances being estimated.</param>
/// <param name="CriticalDeg">Angle at which P falls to 0.05 [deg]; 90 when no angle does.</param>
/// <remarks>Watson 1983 (Statistics on Spheres; form from memory): V = 2 (Σ w - |Σ w m|). For Fisher's law w = k R, which is
/// the reciprocal variance of a mean in one direction; that variance is what is given here, so that law and effective number
/// need not be Fisher's. V/2 is compared with F of 2 and Welch's degrees of freedom.</remarks>
public readonly record struct CommonMeanTest(double AngleDeg, double V, double P, double CriticalDeg)
{
    /// <summary>The test.</summary>
    /// <param name="first">Unit vector of either sign.</param>
    /// <param name="variance1">Variance of the first mean in one direction [rad²], above 0.</param>
    /// <param name="n1">Independent observations it rests on; more than 1.</param>
    /// <param name="second">Unit vector of either sign.</param>
    /// <param name="variance2">Of the second.</param>
    /// <param name="n2">Of the second.</param>
    public static CommonMeanTest Of(Vec3 first, double variance1, double n1, Vec3 second, double variance2, double n2)
    {
        Vec3 other = first.Dot(second) < 0 ? -second : second;
        double w1 = 1 / variance1, w2 = 1 / variance2;
        double angle = Math.Atan2(first.Cross(other).Length, first.Dot(other));
        double v = Statistic(w1, w2, angle);
        double freedom = Math.Pow(variance1 + variance2, 2)
            / ((variance1 * variance1 / (2 * (n1 - 1))) + (variance2 * variance2 / (2 * (n2 - 1))));
        double p = 1 - FisherSnedecor.CDF(2, freedom, v / 2), limit = 2 * FisherSnedecor.InvCDF(2, freedom, 0.95);
        double low = 0, high = Math.PI / 2;
        if (Statistic(w1, w2, high) > limit)
        {
            for (int i = 0; i < 50; i++)
            {
                double middle = (low + high) / 2;
                if (Statistic(w1, w2, middle) > limit) high = middle;
                else low = middle;
            }
        }

        return new CommonMeanTest(angle * 180 / Math.PI, v, p, high * 180 / Math.PI);
    }

    // |w1 m1 + w2 m2|² = (w1 + w2)² - 4 w1 w2 sin²(angle/2), written so that small angles keep their digits.
    private static double Statistic(double w1, double w2, double angle)
    {
        double sum = w1 + w2, short2 = 4 * w1 * w2 * Math.Pow(Math.Sin(angle / 2), 2);
        return 2 * short2 / (sum + Math.Sqrt((sum * sum) - short2));
    }
}
