using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Directions;

/// <summary>Density of axes with an exponential counting kernel, exp(k (|cos| - 1)), in standard deviations above uniform.</summary>
/// <param name="N">Number of axes.</param>
/// <param name="K">Concentration of the kernel, above 2; it falls to 1/e at √(2/k) radians.</param>
/// <remarks>F. W. Vollmer 1995, Comput. Geosci. 21, 31-49 (formulas re-derived): uniform axes give N/k with variance
/// N (k/2 - 1)/k². His kernel follows the number, k = 2 (1 + N/9), so that N/k is 3 standard deviations.</remarks>
public readonly record struct SmoothDensity(int N, double K)
{
    /// <summary>The narrowest kernel used for drawing: 1/e at 8.1 deg. By Vollmer's rule it is reached at 441 axes; beyond,
    /// the rule would draw the scatter inside each set instead of the sets.</summary>
    public const double NarrowestForDrawing = 100;

    // exp(-40) is 4e-18: not seen beside a single axis at the node.
    private const double Negligible = -40;

    /// <summary>Sum expected of uniform axes.</summary>
    public double Expected => N / K;

    /// <summary>Its standard deviation.</summary>
    public double Sigma => Math.Sqrt(N * ((K / 2) - 1)) / K;

    /// <summary>Vollmer's kernel for a number of axes.</summary>
    /// <param name="n">Number of axes.</param>
    /// <param name="m">Standard deviations of the uniform expectation; 3 is usual.</param>
    public static SmoothDensity Vollmer(int n, double m = 3) => new(n, 2 * (1 + (n / (m * m))));

    /// <summary>Vollmer's kernel, never narrower than <see cref="NarrowestForDrawing"/>.</summary>
    public static SmoothDensity ForDrawing(int n) => new(n, Math.Min(NarrowestForDrawing, Vollmer(n).K));

    /// <summary>Sum of the kernel over all axes.</summary>
    /// <param name="axes">Unit vectors of either sign.</param>
    /// <param name="node">Unit vector of either sign.</param>
    public double Sum(ReadOnlySpan<Vec3> axes, Vec3 node)
    {
        double sum = 0;
        foreach (Vec3 a in axes)
        {
            double e = K * (Math.Abs(a.Dot(node)) - 1);
            if (e > Negligible) sum += Math.Exp(e);
        }

        return sum;
    }

    /// <summary>The same for axes that count differently.</summary>
    /// <param name="axes">Unit vectors of either sign.</param>
    /// <param name="weights">Above 0, one an axis; their scale does not matter.</param>
    /// <param name="node">Unit vector of either sign.</param>
    /// <remarks>A weighted sum of independent axes: uniform axes give W/k with variance Σw² (k/2 - 1)/k². Equal weights give
    /// the plain form.</remarks>
    public double Excess(ReadOnlySpan<Vec3> axes, ReadOnlySpan<double> weights, Vec3 node)
    {
        double sum = 0, all = 0, squares = 0;
        for (int i = 0; i < axes.Length; i++)
        {
            all += weights[i];
            squares += weights[i] * weights[i];
            double e = K * (Math.Abs(axes[i].Dot(node)) - 1);
            if (e > Negligible) sum += weights[i] * Math.Exp(e);
        }

        return (sum - (all / K)) / (Math.Sqrt(squares * ((K / 2) - 1)) / K);
    }

    /// <summary>(sum - expected)/σ: standard deviations above uniform.</summary>
    public double Excess(ReadOnlySpan<Vec3> axes, Vec3 node) => (Sum(axes, node) - Expected) / Sigma;
}
