using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Directions;

/// <summary>Fisher's law of directions on the sphere: density κ/(4π sinh κ) exp(κ cos θ).</summary>
/// <remarks>R. A. Fisher 1953, Dispersion on a sphere, Proc. R. Soc. A 217, 295-305.</remarks>
public static class Fisher
{
    private const double Degree = Math.PI / 180;

    /// <summary>Mean of cos θ: coth κ - 1/κ (Langevin's function), odd in κ.</summary>
    public static double MeanLength(double kappa)
    {
        double k = Math.Abs(kappa);
        if (k < 1e-2) return kappa / 3 * (1 - (k * k / 15) + (2 * k * k * k * k / 315));
        double e = Math.Exp(-2 * k);
        return Math.Sign(kappa) * (((1 + e) / -Accurate.ExpMinusOne(-2 * k)) - (1 / k));
    }

    /// <summary>ln of κ/(4π sinh κ); no overflow at any κ ≥ 0.</summary>
    public static double LogNormaliser(double kappa)
    {
        if (kappa < 1e-4) return -Math.Log(4 * Math.PI) - (kappa * kappa / 6);
        return Math.Log(kappa / (2 * Math.PI)) - kappa - Math.Log(-Accurate.ExpMinusOne(-2 * kappa));
    }

    /// <summary>κ by maximum likelihood: solves <see cref="MeanLength"/>(κ) = meanLength.</summary>
    /// <param name="meanLength">R/N, 0 to 1.</param>
    /// <returns>0 for 0, +∞ for 1.</returns>
    public static double KappaOf(double meanLength)
    {
        if (!(meanLength > 0)) return 0;
        if (meanLength >= 1) return double.PositiveInfinity;

        // Exact in both limits to first order; Newton then doubles the digits each round.
        double r2 = meanLength * meanLength, kappa = meanLength * (3 - r2) / (1 - r2);
        for (int i = 0; i < 60; i++)
        {
            double a = MeanLength(kappa);
            double slope = kappa < 1e-3 ? 1.0 / 3 : 1 - (a * a) - (2 * a / kappa);
            double next = Math.Max(kappa / 4, kappa - ((a - meanLength) / slope));
            bool done = Math.Abs(next - kappa) <= 1e-14 * kappa;
            kappa = next;
            if (done) break;
        }

        return kappa;
    }

    /// <summary>Fisher's exact cone of confidence of the mean: cos α = 1 - (N - R)/R (p^(-1/(N-1)) - 1), in degrees.</summary>
    /// <param name="n">Number of directions; need not be whole (effective number).</param>
    /// <param name="r">Length of their sum.</param>
    /// <param name="p">Probability left outside: 0.05 for the 95 % cone.</param>
    /// <returns>180 when nothing is known: n ≤ 1, or a cosine below -1.</returns>
    public static double ConeDeg(double n, double r, double p = 0.05)
    {
        if (!(n > 1) || !(r > 0)) return 180;
        double c = 1 - ((n - r) / r * (Math.Pow(p, -1 / (n - 1)) - 1));
        return c <= -1 ? 180 : Math.Acos(Math.Min(1, c)) / Degree;
    }

    /// <summary>cos θ below which a share u of Fisher's law lies, as 1 - cos θ (which keeps its digits at large κ).</summary>
    /// <param name="kappa">Above 0.</param>
    /// <param name="u">0 &lt; u &lt; 1.</param>
    /// <remarks>Inverse of the cumulative law: cos θ = 1 + ln(u + (1 - u) exp(-2κ))/κ.</remarks>
    public static double OneMinusCosine(double kappa, double u)
    {
        double lost = -Accurate.ExpMinusOne(-2 * kappa);   // 1 - exp(-2κ)
        double inner = u > 0.5 ? Accurate.LogOnePlus(-(1 - u) * lost) : Math.Log(u + ((1 - u) * Math.Exp(-2 * kappa)));
        return -inner / kappa;
    }

    /// <summary>One draw about a mean direction.</summary>
    /// <param name="mean">Unit vector.</param>
    /// <param name="kappa">Above 0.</param>
    /// <param name="draws">The stream; two numbers are taken.</param>
    public static Vec3 Draw(Vec3 mean, double kappa, ref Draws draws)
    {
        double u = 1 - draws.NextUnit(), turn = 2 * Math.PI * draws.NextUnit();
        double versine = Math.Min(2, OneMinusCosine(kappa, u));
        double sine = Math.Sqrt(versine * (2 - versine));
        (Vec3 e1, Vec3 e2) = Tangent.Axes(mean);
        return (mean * (1 - versine)) + (e1 * (sine * Math.Cos(turn))) + (e2 * (sine * Math.Sin(turn)));
    }
}
