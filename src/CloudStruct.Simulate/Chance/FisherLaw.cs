namespace CloudStruct.Simulate.Chance;

/// <summary>Fisher 1953: directions about a mean with density proportional to exp(kappa cos theta).</summary>
public static class FisherLaw
{
    /// <summary>Cosine of the angle from the mean for a probability u: the inverse of the distribution of cos theta.</summary>
    /// <param name="kappa">Concentration, above 0; large values are safe.</param>
    /// <param name="u">0 ≤ u ≤ 1; 0 gives -1, 1 gives 1.</param>
    /// <remarks>From P(cos ≤ c) = (exp(kappa c) - exp(-kappa)) / (exp(kappa) - exp(-kappa)), solved for c. Written with
    /// log1p and expm1 so that 1 - c keeps its digits for large kappa and nothing overflows.</remarks>
    public static double CosTheta(double kappa, double u) => 1 - OneMinusCos(kappa, u);

    /// <summary>1 minus the cosine, with all its digits (for kappa 10000 it is of the order of 1e-4).</summary>
    public static double OneMinusCos(double kappa, double u)
    {
        // c = 1 + ln(u + (1 - u) e^(-2k)) / k, and u + (1-u) e = 1 + (1 - u)(e - 1).
        double argument = (1 - u) * -ExpMinusOne(-2 * kappa);
        if (argument >= 1) return 2;
        return Math.Min(2, -LogOnePlus(-argument) / kappa);
    }

    /// <summary>exp(x) - 1 without loss of digits for small x.</summary>
    private static double ExpMinusOne(double x)
    {
        if (Math.Abs(x) > 0.5) return Math.Exp(x) - 1;
        double half = Math.Sinh(x / 2);   // e^x - 1 = 2 e^(x/2) sinh(x/2)
        return 2 * Math.Exp(x / 2) * half;
    }

    /// <summary>ln(1 + x) without loss of digits for small x.</summary>
    private static double LogOnePlus(double x)
    {
        double sum = 1 + x;   // the rounding of 1 + x cancels in the quotient
        return sum == 1 ? x : Math.Log(sum) * x / (sum - 1);
    }
}
