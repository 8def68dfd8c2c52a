namespace CloudStruct.Maths.Directions;

/// <summary>Modified Bessel functions of order 0 and 1 times exp(-x), which never overflow.</summary>
/// <remarks>Power series up to <see cref="Turn"/>, where all terms are positive and nothing cancels; beyond it the
/// asymptotic series, whose terms fall below 1e-16 before they grow (Abramowitz and Stegun 1964, 9.6.10 and 9.7.1).</remarks>
internal static class ScaledBessel
{
    private const double Turn = 30;

    /// <summary>exp(-x) I0(x), x ≥ 0.</summary>
    public static double I0(double x) => x <= Turn ? Series(x, 0) : Asymptotic(x, 0);

    /// <summary>exp(-x) I1(x), x ≥ 0.</summary>
    public static double I1(double x) => x <= Turn ? x / 2 * Series(x, 1) : Asymptotic(x, 4);

    private static double Series(double x, int order)
    {
        double q = x * x / 4, term = 1, sum = 1;
        for (int k = 1; term > 1e-17 * sum; k++)
        {
            term *= q / (k * (double)(k + order));
            sum += term;
        }

        return sum * Math.Exp(-x);
    }

    private static double Asymptotic(double x, int fourOrderSquared)
    {
        double term = 1, sum = 1;
        for (int k = 1; k < 60; k++)
        {
            double odd = (2 * k) - 1, next = -term * (fourOrderSquared - (odd * odd)) / (k * 8 * x);
            if (Math.Abs(next) < 1e-17 || Math.Abs(next) > Math.Abs(term)) break;
            term = next;
            sum += term;
        }

        return sum / Math.Sqrt(2 * Math.PI * x);
    }
}
