using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace CloudStruct.Maths.Mixtures;

/// <summary>A mixture of normal distributions.</summary>
public sealed partial class GaussianMixture
{
    private readonly double[] factors;      // per component: Cholesky factor of its covariance
    private readonly double[] logConstant;  // ln weight - (d ln 2π + ln det)/2

    private GaussianMixture(int dimensions, CovarianceModel model, double[] weights, double[] means, double[] covariances)
    {
        Dimensions = dimensions;
        Model = model;
        Weights = weights;
        Means = means;
        Covariances = covariances;
        factors = (double[])covariances.Clone();
        logConstant = new double[weights.Length];
        int dd = dimensions * dimensions;
        for (int c = 0; c < weights.Length; c++)
        {
            Span<double> f = factors.AsSpan(c * dd, dd);
            if (!Cholesky.Factor(f, dimensions)) throw new ArgumentException("a covariance is not positive", nameof(covariances));
            logConstant[c] = Math.Log(weights[c]) - (0.5 * ((dimensions * Math.Log(2 * Math.PI)) + Cholesky.LogDeterminant(f, dimensions)));
        }
    }

    /// <summary>Length of an item.</summary>
    public int Dimensions { get; }

    /// <summary>What the components share.</summary>
    public CovarianceModel Model { get; }

    /// <summary>Number of components.</summary>
    public int Components => Weights.Length;

    /// <summary>Weights of the components, sum 1, falling.</summary>
    public double[] Weights { get; }

    /// <summary>Row-major: a mean per component.</summary>
    public double[] Means { get; }

    /// <summary>Row-major: a full matrix per component.</summary>
    public double[] Covariances { get; }

    /// <summary>Log-likelihood of the items it was fitted to.</summary>
    public double LogLikelihood { get; private init; }

    /// <summary>Free parameters: weights, means, covariances.</summary>
    public int Parameters
    {
        get
        {
            int perCovariance = Dimensions * (Dimensions + 1) / 2;
            return Components - 1 + (Components * Dimensions) + (Model == CovarianceModel.Common ? perCovariance : Components * perCovariance);
        }
    }

    /// <summary>Schwarz criterion 2 ln L - k ln n, larger is better, with the likelihood scaled from the items fitted to
    /// the number of independent items that they are worth.</summary>
    /// <param name="items">Items fitted to.</param>
    /// <param name="effective">Independent items they are worth; equal to <paramref name="items"/> for the common form.</param>
    public double Bic(int items, double effective) =>
        (2 * LogLikelihood * effective / items) - (Parameters * Math.Log(effective));

    /// <summary>Log of weight times density per component.</summary>
    /// <param name="item">As long as <see cref="Dimensions"/>.</param>
    /// <param name="logDensity">[out] As long as <see cref="Components"/>.</param>
    /// <returns>Log of the mixture's density.</returns>
    public double LogDensities(ReadOnlySpan<double> item, Span<double> logDensity)
    {
        int d = Dimensions;
        Span<double> v = stackalloc double[d];
        double top = double.NegativeInfinity;
        for (int c = 0; c < Components; c++)
        {
            for (int j = 0; j < d; j++) v[j] = item[j] - Means[(c * d) + j];
            double square = Cholesky.Whiten(factors.AsSpan(c * d * d, d * d), d, v);
            logDensity[c] = logConstant[c] - (0.5 * square);
            top = Math.Max(top, logDensity[c]);
        }

        double sum = 0;
        for (int c = 0; c < Components; c++) sum += Math.Exp(logDensity[c] - top);
        return top + Math.Log(sum);
    }

    /// <summary>The same for four items at once, one in each lane; up to the last bits of exponential and logarithm.</summary>
    /// <param name="item">As long as <see cref="Dimensions"/>.</param>
    /// <param name="logDensity">[out] As long as <see cref="Components"/>.</param>
    /// <returns>Logs of the mixture's density.</returns>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public Vector256<double> LogDensities(ReadOnlySpan<Vector256<double>> item, Span<Vector256<double>> logDensity)
    {
        unchecked
        {
            int d = Dimensions;
            Span<Vector256<double>> v = stackalloc Vector256<double>[d];
            Vector256<double> top = Vector256.Create(double.NegativeInfinity);
            ReadOnlySpan<double> means = Means;
            for (int c = 0; c < logConstant.Length; c++)
            {
                for (int j = 0; j < d; j++) v[j] = item[j] - Vector256.Create(means[(c * d) + j]);
                Vector256<double> square = Cholesky.Whiten(factors.AsSpan(c * d * d, d * d), d, v);
                logDensity[c] = Vector256.Create(logConstant[c]) - (Vector256.Create(0.5) * square);
                top = Vector256.Max(top, logDensity[c]);
            }

            Vector256<double> sum = Vector256<double>.Zero;
            for (int c = 0; c < logConstant.Length; c++) sum += Vector256.Exp(logDensity[c] - top);
            return top + Vector256.Log(sum);
        }
    }
}
