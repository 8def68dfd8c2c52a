using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace CloudStruct.Maths.Mixtures;

/// <summary>Classes told apart by normal distributions whose covariances are drawn toward each other and toward their diagonal.</summary>
/// <remarks>Friedman 1989, Regularized discriminant analysis, J. Am. Stat. Assoc. 84, 165-175: each class's covariance is mixed
/// with the pooled one, the mixture with a multiple of the diagonal, so that few items of a class cannot overfit.</remarks>
public sealed class Discriminant
{
    private readonly int d;
    private readonly double[] means, factors, constants;

    private Discriminant(int dimensions, int classes, double[] means, double[] factors, double[] constants)
    {
        d = dimensions;
        Classes = classes;
        this.means = means;
        this.factors = factors;
        this.constants = constants;
    }

    /// <summary>Number of classes.</summary>
    public int Classes { get; }

    /// <summary>Learns from weighted items.</summary>
    /// <param name="items">Row-major, one row an item.</param>
    /// <param name="dimensions">Length of a row.</param>
    /// <param name="classOf">Class per item, 0 to classes - 1; negative items are left out.</param>
    /// <param name="weights">Weight per item; empty for 1.</param>
    /// <param name="classes">Number of classes.</param>
    /// <param name="toPooled">Share of the pooled covariance in each class's own, 0 to 1 (1: linear discriminant).</param>
    /// <param name="toDiagonal">Share of the diagonal, 0 to 1.</param>
    /// <returns>Null when a class has no item. All classes count as equally likely beforehand.</returns>
    public static Discriminant? Learn(
        ReadOnlySpan<double> items, int dimensions, ReadOnlySpan<int> classOf, ReadOnlySpan<double> weights, int classes, double toPooled, double toDiagonal)
    {
        int d = dimensions, dd = d * d, n = classOf.Length;
        var total = new double[classes];
        var mean = new double[classes * d];
        for (int i = 0; i < n; i++)
        {
            int c = classOf[i];
            if (c < 0) continue;
            double w = weights.IsEmpty ? 1 : weights[i];
            total[c] += w;
            for (int j = 0; j < d; j++) mean[(c * d) + j] += w * items[(i * d) + j];
        }

        for (int c = 0; c < classes; c++)
        {
            if (!(total[c] > 0)) return null;
            for (int j = 0; j < d; j++) mean[(c * d) + j] /= total[c];
        }

        var own = new double[classes * dd];
        Span<double> v = stackalloc double[d];
        for (int i = 0; i < n; i++)
        {
            int c = classOf[i];
            if (c < 0) continue;
            double w = (weights.IsEmpty ? 1 : weights[i]) / total[c];
            for (int j = 0; j < d; j++) v[j] = items[(i * d) + j] - mean[(c * d) + j];
            for (int a = 0; a < d; a++)
            {
                for (int b = 0; b <= a; b++) own[(c * dd) + (a * d) + b] += w * v[a] * v[b];
            }
        }

        var pooled = new double[dd];
        for (int c = 0; c < classes; c++)
        {
            for (int e = 0; e < dd; e++) pooled[e] += own[(c * dd) + e] / classes;
        }

        var constant = new double[classes];
        for (int c = 0; c < classes; c++)
        {
            Span<double> m = own.AsSpan(c * dd, dd);
            for (int a = 0; a < d; a++)
            {
                for (int b = 0; b <= a; b++)
                {
                    double mixed = ((1 - toPooled) * m[(a * d) + b]) + (toPooled * pooled[(a * d) + b]);
                    m[(a * d) + b] = a == b ? mixed + (1e-9 * pooled[(a * d) + a]) + 1e-12 : (1 - toDiagonal) * mixed;
                }
            }

            if (!Cholesky.Factor(m, d)) return null;
            constant[c] = -0.5 * Cholesky.LogDeterminant(m, d);
        }

        return new Discriminant(d, classes, mean, own, constant);
    }

    /// <summary>Log density per class up to a common constant.</summary>
    /// <param name="item">As long as a training row.</param>
    /// <param name="logs">[out] As long as <see cref="Classes"/>.</param>
    public void Logs(ReadOnlySpan<double> item, Span<double> logs)
    {
        Span<double> v = stackalloc double[d];
        for (int c = 0; c < Classes; c++)
        {
            for (int j = 0; j < d; j++) v[j] = item[j] - means[(c * d) + j];
            logs[c] = constants[c] - (0.5 * Cholesky.Whiten(factors.AsSpan(c * d * d, d * d), d, v));
        }
    }

    /// <summary>The same for four items at once, one in each lane.</summary>
    /// <param name="item">As long as a training row.</param>
    /// <param name="logs">[out] As long as <see cref="Classes"/>.</param>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public void Logs(ReadOnlySpan<Vector256<double>> item, Span<Vector256<double>> logs)
    {
        unchecked
        {
            Span<Vector256<double>> v = stackalloc Vector256<double>[d];
            for (int c = 0; c < Classes; c++)
            {
                for (int j = 0; j < d; j++) v[j] = item[j] - Vector256.Create(means[(c * d) + j]);
                logs[c] = Vector256.Create(constants[c]) - (Vector256.Create(0.5) * Cholesky.Whiten(factors.AsSpan(c * d * d, d * d), d, v));
            }
        }
    }
}
