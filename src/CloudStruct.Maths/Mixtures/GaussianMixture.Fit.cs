using System.Runtime.Intrinsics;
using CloudStruct.Maths.Blocks;

namespace CloudStruct.Maths.Mixtures;

/// <summary>Fitting by expectation and maximisation from spread starts.</summary>
public sealed partial class GaussianMixture
{
    /// <summary>Fits one mixture: the best of several starts.</summary>
    /// <param name="items">Row-major, one row an item.</param>
    /// <param name="dimensions">Length of a row.</param>
    /// <param name="components">Number of components.</param>
    /// <param name="model">What they share.</param>
    /// <param name="seed">Seed of the starts.</param>
    /// <param name="starts">Number of starts; each is spread by distance (Arthur and Vassilvitskii 2007, k-means++).</param>
    /// <param name="rounds">Most rounds per start.</param>
    /// <returns>Null when no start gave positive covariances (too few or equal items).</returns>
    /// <remarks>Dempster, Laird and Rubin 1977, J. R. Stat. Soc. B 39, 1-38. Each covariance gets 1e-6 of the items' own
    /// variance on its diagonal, so that a component cannot shrink onto one item.</remarks>
    public static GaussianMixture? Fit(
        ReadOnlySpan<double> items, int dimensions, int components, CovarianceModel model, ulong seed, int starts = 10, int rounds = 500)
    {
        int n = items.Length / dimensions;
        if (n <= dimensions * components) return null;
        double[] spread = Variances(items, dimensions);
        GaussianMixture? best = null;
        for (int s = 0; s < starts; s++)
        {
            var draws = new Draws(seed, 0x6D69_7874, (ulong)((components * 1000) + s));
            GaussianMixture? found = Climb(items, dimensions, StartShares(items, dimensions, components, spread, ref draws), components, model, spread, rounds);
            if (found != null && (best == null || found.LogLikelihood > best.LogLikelihood)) best = found;
        }

        return best;
    }

    /// <summary>Fits 1 to <paramref name="most"/> components and keeps the best by <see cref="Bic"/>.</summary>
    /// <param name="items">Row-major, one row an item.</param>
    /// <param name="dimensions">Length of a row.</param>
    /// <param name="most">Most components.</param>
    /// <param name="model">What they share.</param>
    /// <param name="effective">Independent items that the items are worth.</param>
    /// <param name="seed">Seed of the starts.</param>
    /// <param name="starts">Number of starts.</param>
    /// <param name="rounds">Most rounds per start.</param>
    /// <param name="threads">Numbers of components tried at once.</param>
    /// <remarks>Fraley and Raftery 2002, J. Am. Stat. Assoc. 97, 611-631.</remarks>
    public static GaussianMixture? Choose(
        ReadOnlySpan<double> items, int dimensions, int most, CovarianceModel model, double effective, ulong seed, int starts = 10, int rounds = 500, int threads = 1)
    {
        GaussianMixture? best = null;
        int n = items.Length / dimensions;
        var fits = new GaussianMixture?[most + 1];
        double[] own = threads > 1 ? items.ToArray() : [];
        // The largest takes longest and starts first.
        if (threads > 1) BlockParallel.For(most, threads, CancellationToken.None, (from, _) => fits[most - from] = Fit(own, dimensions, most - from, model, seed, most - from == 1 ? 1 : starts, rounds), length: 1);
        for (int k = 1; k <= most; k++)
        {
            GaussianMixture? fit = threads > 1 ? fits[k] : Fit(items, dimensions, k, model, seed, k == 1 ? 1 : starts, rounds);
            if (fit == null) break;
            if (best == null || fit.Bic(n, effective) > best.Bic(n, effective)) best = fit;
        }

        return best;
    }

    private static double[] Variances(ReadOnlySpan<double> items, int d)
    {
        int n = items.Length / d;
        var variances = new double[d];
        for (int j = 0; j < d; j++)
        {
            double mean = 0, sum = 0;
            for (int i = 0; i < n; i++) mean += items[(i * d) + j];
            mean /= n;
            for (int i = 0; i < n; i++) sum += (items[(i * d) + j] - mean) * (items[(i * d) + j] - mean);
            variances[j] = sum / n;
        }

        return variances;
    }

    private static double[] StartShares(ReadOnlySpan<double> items, int d, int k, double[] spread, ref Draws draws)
    {
        int n = items.Length / d;
        var centre = new int[k];
        var nearest = new double[n];
        Array.Fill(nearest, double.MaxValue);
        var share = new double[n * k];
        var owner = new int[n];
        centre[0] = draws.NextBelow(n);
        for (int c = 0; c < k; c++)
        {
            double total = 0;
            for (int i = 0; i < n; i++)
            {
                double square = 0;
                for (int j = 0; j < d; j++)
                {
                    double t = items[(i * d) + j] - items[(centre[c] * d) + j];
                    square += t * t / Math.Max(spread[j], 1e-300);
                }

                if (square < nearest[i])
                {
                    nearest[i] = square;
                    owner[i] = c;
                }

                total += nearest[i];
            }

            if (c + 1 == k) break;
            double pick = draws.NextUnit() * total;
            int chosen = 0;
            for (int i = 0; i < n; i++)
            {
                pick -= nearest[i];
                chosen = i;
                if (pick < 0) break;
            }

            centre[c + 1] = chosen;
        }

        for (int i = 0; i < n; i++) share[(i * k) + owner[i]] = 1;
        return share;
    }

    private static GaussianMixture? Climb(
        ReadOnlySpan<double> items, int d, double[] share, int k, CovarianceModel model, double[] spread, int rounds)
    {
        int n = items.Length / d;
        double before = double.NegativeInfinity;
        GaussianMixture? current = null;
        Span<Vector256<double>> item = stackalloc Vector256<double>[d], logs = stackalloc Vector256<double>[k];
        for (int round = 0; round < rounds; round++)
        {
            GaussianMixture? made = Maximise(items, d, share, k, model, spread);
            if (made == null) return current;
            double likelihood = 0;
            for (int i = 0; i < n; i += 4)
            {
                int last = Math.Min(4, n - i) - 1;
                for (int j = 0; j < d; j++)
                {
                    item[j] = Vector256.Create(items[(i * d) + j], items[((i + Math.Min(1, last)) * d) + j], items[((i + Math.Min(2, last)) * d) + j], items[((i + last) * d) + j]);
                }

                Vector256<double> log = made.LogDensities(item, logs);
                for (int e = 0; e <= last; e++) likelihood += log[e];
                for (int c = 0; c < k; c++)
                {
                    Vector256<double> r = Vector256.Exp(logs[c] - log);
                    for (int e = 0; e <= last; e++) share[((i + e) * k) + c] = r[e];
                }
            }

            current = new GaussianMixture(d, model, made.Weights, made.Means, made.Covariances) { LogLikelihood = likelihood };
            if (likelihood - before < 1e-9 * Math.Abs(likelihood)) break;
            before = likelihood;
        }

        return current == null ? null : Sorted(current);
    }

    private static GaussianMixture? Maximise(ReadOnlySpan<double> items, int d, double[] share, int k, CovarianceModel model, double[] spread)
    {
        int n = items.Length / d, dd = d * d;
        var weight = new double[k];
        var mean = new double[k * d];
        var covariance = new double[k * dd];
        unchecked
        {
            for (int i = 0; i < n; i++)
            {
                ReadOnlySpan<double> item = items.Slice(i * d, d);
                for (int c = 0; c < k; c++)
                {
                    double r = share[(i * k) + c];
                    weight[c] += r;
                    Span<double> m = mean.AsSpan(c * d, d);
                    for (int j = 0; j < m.Length; j++) m[j] += r * item[j];
                }
            }
        }

        for (int c = 0; c < k; c++)
        {
            if (weight[c] < d + 1) return null;
            for (int j = 0; j < d; j++) mean[(c * d) + j] /= weight[c];
        }

        Span<double> v = stackalloc double[d];
        unchecked
        {
            for (int i = 0; i < n; i++)
            {
                for (int c = 0; c < k; c++)
                {
                    double r = share[(i * k) + c];
                    if (r < 1e-12) continue;
                    for (int j = 0; j < d; j++) v[j] = items[(i * d) + j] - mean[(c * d) + j];
                    Span<double> m = covariance.AsSpan(c * dd, dd);
                    for (int a = 0; a < d; a++)
                    {
                        for (int b = 0; b <= a; b++) m[(a * d) + b] += r * v[a] * v[b];
                    }
                }
            }
        }

        if (model == CovarianceModel.Common)
        {
            for (int e = 0; e < dd; e++)
            {
                double sum = 0;
                for (int c = 0; c < k; c++) sum += covariance[(c * dd) + e];
                for (int c = 0; c < k; c++) covariance[(c * dd) + e] = sum / n;
            }
        }
        else
        {
            for (int c = 0; c < k; c++)
            {
                for (int e = 0; e < dd; e++) covariance[(c * dd) + e] /= weight[c];
            }
        }

        for (int c = 0; c < k; c++)
        {
            Span<double> m = covariance.AsSpan(c * dd, dd);
            for (int a = 0; a < d; a++)
            {
                m[(a * d) + a] += 1e-6 * spread[a];
                for (int b = 0; b < a; b++) m[(b * d) + a] = m[(a * d) + b];
            }

            if (!Cholesky.Factor(m.ToArray(), d)) return null;
            weight[c] /= n;
        }

        return new GaussianMixture(d, model, weight, mean, covariance);
    }

    private static GaussianMixture Sorted(GaussianMixture m)
    {
        int d = m.Dimensions, dd = d * d;
        int[] order = [.. Enumerable.Range(0, m.Components).OrderByDescending(c => m.Weights[c]).ThenBy(c => c)];
        var means = new double[m.Means.Length];
        var covariances = new double[m.Covariances.Length];
        for (int c = 0; c < order.Length; c++)
        {
            Array.Copy(m.Means, order[c] * d, means, c * d, d);
            Array.Copy(m.Covariances, order[c] * dd, covariances, c * dd, dd);
        }

        return new GaussianMixture(d, m.Model, [.. order.Select(c => m.Weights[c])], means, covariances) { LogLikelihood = m.LogLikelihood };
    }
}
