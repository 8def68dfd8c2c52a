namespace CloudStruct.Maths.Fitting;

/// <summary>Linear least squares with few unknowns, by its normal equations.</summary>
/// <remarks>For well-scaled problems of up to some ten unknowns; the normal equations square the condition number.</remarks>
public static class LeastSquares
{
    /// <summary>Minimises |A x - d|².</summary>
    /// <param name="rows">A, row-major, already weighted.</param>
    /// <param name="d">Right side, already weighted.</param>
    /// <param name="unknowns">Columns of A.</param>
    /// <returns>The unknowns, the diagonal of the inverse normal matrix (their variances for unit weights), and the sum of
    /// squared residuals; null when the unknowns are not fixed by the rows.</returns>
    public static (double[] X, double[] Variances, double SumOfSquares)? Solve(double[] rows, double[] d, int unknowns)
    {
        var normal = new double[unknowns * unknowns];
        var right = new double[unknowns];
        for (int r = 0; r < d.Length; r++)
        {
            ReadOnlySpan<double> row = rows.AsSpan(r * unknowns, unknowns);
            for (int i = 0; i < unknowns; i++)
            {
                right[i] += row[i] * d[r];
                for (int j = 0; j < unknowns; j++) normal[(i * unknowns) + j] += row[i] * row[j];
            }
        }

        if (!LowerTriangle.Factor(normal, unknowns, out _)) return null;
        double[] inverse = LowerTriangle.Inverse(normal, unknowns);
        double[] x = new double[unknowns], variances = new double[unknowns];
        for (int i = 0; i < unknowns; i++)
        {
            for (int j = 0; j < unknowns; j++) x[i] += inverse[(i * unknowns) + j] * right[j];
            variances[i] = inverse[(i * unknowns) + i];
        }

        double sum = 0;
        for (int r = 0; r < d.Length; r++)
        {
            double residual = -d[r];
            for (int i = 0; i < unknowns; i++) residual += rows[(r * unknowns) + i] * x[i];
            sum += residual * residual;
        }

        return (x, variances, sum);
    }
}
