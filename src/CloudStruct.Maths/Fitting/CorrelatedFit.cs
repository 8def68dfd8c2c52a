namespace CloudStruct.Maths.Fitting;

/// <summary>Generalised least squares: linear parameters from observations with a full covariance, with a prior where one is known.</summary>
/// <remarks>Aitken 1936, On least squares and linear combination of observations. The residual likelihood is that of
/// Patterson and Thompson 1971, Recovery of inter-block information when block sizes are unequal (both from memory).
/// Dense: cost grows with the cube of the observations; meant for some hundred.</remarks>
public sealed class CorrelatedFit
{
    private readonly double[] factor;      // lower triangle of the covariance's Cholesky factor, row-major n by n
    private readonly double[] whitened;    // design after forward substitution, row-major n by p
    private readonly double[] residual;    // whitened residuals
    private readonly int count, parameters;

    private CorrelatedFit(double[] factor, double[] whitened, double[] residual, double[] beta, double[] covariance, double likelihoodTerm, double noiseTerm)
    {
        this.factor = factor;
        this.whitened = whitened;
        this.residual = residual;
        Beta = beta;
        Covariance = covariance;
        LogDeterminants = likelihoodTerm;
        NoiseLogDeterminant = noiseTerm;
        count = residual.Length;
        parameters = beta.Length;
        foreach (double r in residual) SquareSum += r * r;
    }

    /// <summary>Parameters.</summary>
    public double[] Beta { get; }

    /// <summary>Their covariance, row-major p by p, for the covariance of observations that was given.</summary>
    public double[] Covariance { get; }

    /// <summary>Sum of squared whitened residuals: about n - p when the covariance given is right.</summary>
    public double SquareSum { get; }

    /// <summary>ln det K + ln det(Xᵀ K⁻¹ X + prior): the part of minus twice the residual log likelihood that is not
    /// <see cref="SquareSum"/>.</summary>
    public double LogDeterminants { get; }

    /// <summary>ln det K: the part of minus twice the log likelihood that is not <see cref="SquareSum"/>, for models that differ in
    /// their parameters.</summary>
    public double NoiseLogDeterminant { get; }

    /// <summary>Variance of a linear combination of the parameters.</summary>
    public double VarianceOf(ReadOnlySpan<double> combination)
    {
        double sum = 0;
        for (int i = 0; i < parameters; i++)
        {
            for (int j = 0; j < parameters; j++) sum += combination[i] * Covariance[(i * parameters) + j] * combination[j];
        }

        return sum;
    }

    /// <summary>How far each observation lies from what all others say of it, in standard deviations of that difference (the
    /// parameters taken as known).</summary>
    /// <remarks>With P the inverse of the covariance and r the residuals: (P r)_i / √P_ii (Dubrule 1983, cross validation of
    /// kriging in a unique neighbourhood, from memory).</remarks>
    public double[] LeaveOneOut()
    {
        double[] inverse = LowerTriangle.Inverse(factor, count);
        double[] v = [.. residual];
        for (int i = count - 1; i >= 0; i--)
        {
            v[i] /= factor[(i * count) + i];
            for (int j = 0; j < i; j++) v[j] -= factor[(i * count) + j] * v[i];
        }

        for (int i = 0; i < count; i++) v[i] /= Math.Sqrt(inverse[(i * count) + i]);
        return v;
    }

    /// <summary>Best value at a new place, and the variance of its error, when the correlated part of the noise belongs to
    /// what is looked for (kriging with the fitted trend).</summary>
    /// <param name="design">Row of the design at the place.</param>
    /// <param name="covarianceToData">Covariance of the place's own correlated part with every observation; n values; overwritten.</param>
    /// <param name="ownVariance">Variance of the place's correlated part.</param>
    /// <remarks>Universal kriging, Matheron 1969 (from memory).</remarks>
    public (double Value, double Variance) Predict(ReadOnlySpan<double> design, Span<double> covarianceToData, double ownVariance)
    {
        LowerTriangle.Forward(factor, count, covarianceToData);
        double value = 0, explained = 0;
        Span<double> left = stackalloc double[parameters];
        design.CopyTo(left);
        for (int i = 0; i < count; i++)
        {
            double k = covarianceToData[i];
            explained += k * k;
            value += k * residual[i];
            for (int j = 0; j < parameters; j++) left[j] -= k * whitened[(i * parameters) + j];
        }

        for (int j = 0; j < parameters; j++) value += design[j] * Beta[j];
        return (value, Math.Max(0, ownVariance - explained) + VarianceOf(left));
    }

    /// <summary>Solves.</summary>
    /// <param name="design">Row-major, n rows of p.</param>
    /// <param name="observations">n values.</param>
    /// <param name="covariance">Row-major n by n, lower triangle used; overwritten by its factor.</param>
    /// <param name="priorPrecision">1/variance of a prior with mean 0, per parameter; 0 for none.</param>
    /// <returns>Null when the covariance or the normal matrix is singular.</returns>
    public static CorrelatedFit? Solve(
        ReadOnlySpan<double> design, ReadOnlySpan<double> observations, double[] covariance, ReadOnlySpan<double> priorPrecision)
    {
        int n = observations.Length, p = priorPrecision.Length;
        if (!LowerTriangle.Factor(covariance, n, out double logDet)) return null;
        var x = new double[n * p];
        var column = new double[n];
        for (int j = 0; j < p; j++)
        {
            for (int i = 0; i < n; i++) column[i] = design[(i * p) + j];
            LowerTriangle.Forward(covariance, n, column);
            for (int i = 0; i < n; i++) x[(i * p) + j] = column[i];
        }

        double[] y = observations.ToArray();
        LowerTriangle.Forward(covariance, n, y);
        var normal = new double[p * p];
        var right = new double[p];
        for (int i = 0; i < n; i++)
        {
            for (int a = 0; a < p; a++)
            {
                right[a] += x[(i * p) + a] * y[i];
                for (int b = 0; b <= a; b++) normal[(a * p) + b] += x[(i * p) + a] * x[(i * p) + b];
            }
        }

        for (int a = 0; a < p; a++) normal[(a * p) + a] += priorPrecision[a];
        if (!LowerTriangle.Factor(normal, p, out double logDetNormal)) return null;
        double[] inverse = LowerTriangle.Inverse(normal, p);
        var beta = new double[p];
        for (int a = 0; a < p; a++)
        {
            for (int b = 0; b < p; b++) beta[a] += inverse[(a * p) + b] * right[b];
        }

        for (int i = 0; i < n; i++)
        {
            for (int a = 0; a < p; a++) y[i] -= x[(i * p) + a] * beta[a];
        }

        return new CorrelatedFit(covariance, x, y, beta, inverse, logDet + logDetNormal, logDet);
    }
}
