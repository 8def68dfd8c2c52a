namespace CloudStruct.Maths.Fitting;

/// <summary>Weighted linear least squares with few parameters.</summary>
public static class WeightedFit
{
    /// <summary>Parameters that minimise Σ w (y - x b)² + Σ precision b².</summary>
    /// <param name="design">Row-major, n rows of p.</param>
    /// <param name="observations">n values.</param>
    /// <param name="weights">n values, 0 leaves an observation out.</param>
    /// <param name="priorPrecision">Per parameter, in the unit of the weights; 0 for none.</param>
    /// <returns>Null when the normal matrix is singular.</returns>
    public static double[]? Solve(
        ReadOnlySpan<double> design, ReadOnlySpan<double> observations, ReadOnlySpan<double> weights, ReadOnlySpan<double> priorPrecision)
    {
        int n = observations.Length, p = priorPrecision.Length;
        var normal = new double[p * p];
        var right = new double[p];
        for (int i = 0; i < n; i++)
        {
            double w = weights[i];
            if (w == 0) continue;
            for (int a = 0; a < p; a++)
            {
                double x = w * design[(i * p) + a];
                right[a] += x * observations[i];
                for (int b = 0; b <= a; b++) normal[(a * p) + b] += x * design[(i * p) + b];
            }
        }

        for (int a = 0; a < p; a++) normal[(a * p) + a] += priorPrecision[a];
        if (!LowerTriangle.Factor(normal, p, out _)) return null;
        double[] inverse = LowerTriangle.Inverse(normal, p);
        var beta = new double[p];
        for (int a = 0; a < p; a++)
        {
            for (int b = 0; b < p; b++) beta[a] += inverse[(a * p) + b] * right[b];
        }

        return beta;
    }

    /// <summary>Bisquare weights of residuals, (1 - (r/4.685 s)²)² inside and 0 outside, s = 1.4826 times the median absolute
    /// residual of those that have a weight, not below a floor.</summary>
    /// <param name="residuals">n values.</param>
    /// <param name="prior">Weights that the bisquare is multiplied to.</param>
    /// <param name="floor">Smallest scale.</param>
    /// <param name="weights">[out] n values.</param>
    /// <returns>The scale s.</returns>
    /// <remarks>Beaton and Tukey 1974; constant for 95 % efficiency under normal errors (common practice).</remarks>
    public static double Bisquare(ReadOnlySpan<double> residuals, ReadOnlySpan<double> prior, double floor, Span<double> weights)
    {
        var size = new List<double>(residuals.Length);
        for (int i = 0; i < residuals.Length; i++)
        {
            if (prior[i] > 0) size.Add(Math.Abs(residuals[i]));
        }

        size.Sort();
        double scale = size.Count == 0 ? floor : Math.Max(floor, 1.4826 * size[size.Count / 2]);
        for (int i = 0; i < residuals.Length; i++)
        {
            double u = residuals[i] / (4.685 * scale);
            weights[i] = Math.Abs(u) < 1 ? prior[i] * (1 - (u * u)) * (1 - (u * u)) : 0;
        }

        return scale;
    }
}
