using MathNet.Numerics;

namespace CloudStruct.Maths.Directions;

/// <summary>Watson's law of axes: density exp(κ cos² θ) / (4π M(κ)); κ &gt; 0 a cluster about the axis, κ &lt; 0 a girdle.</summary>
/// <remarks>M is Kummer's function M(1/2, 3/2, κ), the integral of exp(κ t²) over 0 ≤ t ≤ 1.</remarks>
public static class Watson
{
    // Beyond it the asymptotic series reaches rounding, below it the power series has few terms.
    private const double Turn = 40;

    /// <summary>ln M(1/2, 3/2, κ); no overflow.</summary>
    public static double LogNormaliser(double kappa)
    {
        if (kappa < -Turn) return Math.Log(Math.Sqrt(Math.PI / -kappa) / 2 * SpecialFunctions.Erf(Math.Sqrt(-kappa)));
        if (kappa < 0) return kappa + Math.Log(Rising(-kappa));
        return kappa <= Turn ? Math.Log(Factorial(kappa)) : kappa + Math.Log(Dawson(kappa));
    }

    /// <summary>Mean of cos² θ, rising from 0 (κ = -∞) over 1/3 (κ = 0) to 1.</summary>
    public static double MeanCosineSquared(double kappa)
    {
        // By parts: the integral of t² exp(κ t²) is (exp κ - M)/(2κ).
        if (Math.Abs(kappa) < 0.01) return (1.0 / 3) + (4 * kappa / 45) + (8 * kappa * kappa / 945);
        return Accurate.ExpMinusOne(kappa - LogNormaliser(kappa)) / (2 * kappa);
    }

    /// <summary>κ by maximum likelihood from the eigenvalue of the orientation tensor along the axis (S1 for a cluster).</summary>
    /// <param name="meanCosineSquared">0 to 1.</param>
    /// <returns>-∞ for 0, 0 for 1/3, +∞ for 1.</returns>
    public static double KappaOf(double meanCosineSquared)
    {
        if (!(meanCosineSquared > 0)) return double.NegativeInfinity;
        if (meanCosineSquared >= 1) return double.PositiveInfinity;

        // Both limits bracket the root: cos² θ is about 1 - 1/κ at the top and -1/(2κ) at the bottom.
        double high = meanCosineSquared > 1.0 / 3 ? 2 / (1 - meanCosineSquared) : 1;
        double low = meanCosineSquared < 1.0 / 3 ? -2 / meanCosineSquared : -1;
        for (int i = 0; i < 200 && high - low > 1e-12 * Math.Max(1, Math.Abs(low)); i++)
        {
            double middle = (low + high) / 2;
            if (MeanCosineSquared(middle) < meanCosineSquared) low = middle;
            else high = middle;
        }

        return (low + high) / 2;
    }

    /// <summary>Σ κⁿ / (n! (2n + 1)), all terms positive.</summary>
    private static double Factorial(double kappa)
    {
        double power = 1, sum = 1;
        for (int n = 1; n < 400; n++)
        {
            power *= kappa / n;
            double term = power / ((2 * n) + 1);
            sum += term;
            if (term < 1e-18 * sum && n > kappa) break;
        }

        return sum;
    }

    /// <summary>exp(a) M(1/2, 3/2, -a) = M(1, 3/2, a) = Σ aⁿ / (3/2 · 5/2 ···), all terms positive.</summary>
    private static double Rising(double a)
    {
        double term = 1, sum = 1;
        for (int n = 0; n < 400; n++)
        {
            term *= a / (n + 1.5);
            sum += term;
            if (term < 1e-18 * sum && n > a) break;
        }

        return sum;
    }

    /// <summary>exp(-κ) M for large κ: Dawson's integral over its argument, by its asymptotic series.</summary>
    private static double Dawson(double kappa)
    {
        double term = 1, sum = 1;
        for (int n = 1; n < 60; n++)
        {
            double next = term * ((2 * n) - 1) / (2 * kappa);
            if (next < 1e-17 || next > term) break;
            term = next;
            sum += term;
        }

        return sum / (2 * kappa);
    }
}
