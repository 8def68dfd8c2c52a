using CloudStruct.Records.Width;
using MathNet.Numerics;

namespace CloudStruct.Maths.Rates;

/// <summary>Laws of positive sizes by maximum likelihood, some of them known only to be larger than a value.</summary>
/// <remarks>A size that is cut off enters with the probability of what is larger (Cohen 1965, maximum likelihood estimation in the
/// Weibull distribution based on complete and on censored samples; Tobin 1958 for the normal law; from memory). When sizes
/// resemble their neighbours the log likelihood is scaled to the number of independent ones, which leaves the parameters
/// alone and keeps Akaike's criterion from being sure of itself.</remarks>
public static class CensoredLaws
{
    private const double LargestShape = 1e4;

    /// <summary>Lognormal, Weibull and exponential law, in this order.</summary>
    /// <param name="sizes">Sizes seen whole, above 0.</param>
    /// <param name="larger">Lower bounds of sizes that are cut off, above 0.</param>
    /// <param name="effective">Independent sizes among those seen whole; null: all.</param>
    /// <returns>Empty with fewer than three whole sizes, or when all are equal.</returns>
    public static ThicknessLaw[] Of(IReadOnlyList<double> sizes, IReadOnlyList<double> larger, double? effective = null)
    {
        if (sizes.Count < 3 || !(sizes.Max() > sizes.Min() * (1 + 1e-9)) || !(sizes.Min() > 0)) return [];
        double share = (effective ?? sizes.Count) / sizes.Count;
        (double mu, double sigma, double logNormal) = Lognormal(sizes, larger);
        (double shape, double scale, double weibull) = Weibull(sizes, larger);
        double mean = (sizes.Sum() + larger.Sum()) / sizes.Count, exponential = (-sizes.Count * Math.Log(mean)) - sizes.Count;
        return
        [
            Law(ThicknessLawKind.Lognormal, mu, sigma, logNormal * share),
            Law(ThicknessLawKind.Weibull, shape, scale, weibull * share),
            Law(ThicknessLawKind.Exponential, mean, null, exponential * share),
        ];
    }

    private static ThicknessLaw Law(ThicknessLawKind kind, double first, double? second, double log) =>
        new(kind, first, second, log, (second is null ? 2 : 4) - (2 * log));

    // Expectation and maximisation: what is cut off stands with the mean and mean square of a normal law above its bound.
    private static (double Mu, double Sigma, double Log) Lognormal(IReadOnlyList<double> sizes, IReadOnlyList<double> larger)
    {
        double[] whole = [.. sizes.Select(x => Math.Log(x))], cut = [.. larger.Select(x => Math.Log(x))];
        double mu = whole.Average(), sigma = Math.Sqrt(whole.Sum(y => (y - mu) * (y - mu)) / whole.Length);
        int n = whole.Length + cut.Length;
        for (int round = 0; cut.Length > 0 && round < 2000; round++)
        {
            double sum = whole.Sum(), squares = whole.Sum(y => (y - mu) * (y - mu));
            foreach (double c in cut)
            {
                double z = (c - mu) / sigma, hazard = Hazard(z);
                sum += mu + (sigma * hazard);
                squares += sigma * sigma * (1 + (z * hazard));
            }

            double next = sum / n, spread = Math.Sqrt(Math.Max(1e-24, (squares / n) - ((next - mu) * (next - mu))));
            bool done = Math.Abs(next - mu) + Math.Abs(spread - sigma) < 1e-12;
            (mu, sigma) = (next, spread);
            if (done) break;
        }

        double log = -(whole.Length * (Math.Log(sigma) + (0.5 * Math.Log(2 * Math.PI))));
        foreach (double y in whole) log -= y + ((y - mu) * (y - mu) / (2 * sigma * sigma));
        foreach (double c in cut) log += Math.Log(Math.Max(1e-300, Above((c - mu) / sigma)));
        return (mu, sigma, log);
    }

    // The equation for the shape has one root and falls steadily: bisection on its logarithm.
    private static (double Shape, double Scale, double Log) Weibull(IReadOnlyList<double> sizes, IReadOnlyList<double> larger)
    {
        double top = Math.Max(sizes.Max(), larger.DefaultIfEmpty(0).Max()), meanLog = sizes.Average(x => Math.Log(x / top));
        double Miss(double k)
        {
            double sum = 0, weighted = 0;
            foreach (double x in sizes.Concat(larger))
            {
                double l = Math.Log(x / top), p = Math.Exp(k * l);
                sum += p;
                weighted += p * l;
            }

            return (weighted / sum) - (1 / k) - meanLog;
        }

        double low = Math.Log(1e-3), high = Math.Log(LargestShape);
        for (int i = 0; i < 100; i++)
        {
            double middle = (low + high) / 2;
            if (Miss(Math.Exp(middle)) < 0) low = middle;
            else high = middle;
        }

        double shape = Math.Exp((low + high) / 2), r = sizes.Count;
        double scale = top * Math.Pow(sizes.Concat(larger).Sum(x => Math.Exp(shape * Math.Log(x / top))) / r, 1 / shape);
        double log = (r * Math.Log(shape / scale)) - r;   // the powers sum to the number of whole sizes
        foreach (double x in sizes) log += (shape - 1) * Math.Log(x / scale);
        return (shape, scale, log);
    }

    private static double Above(double z) => 0.5 * SpecialFunctions.Erfc(z / Math.Sqrt(2));

    // Density over the share above; far out its own asymptote.
    private static double Hazard(double z) => z > 30 ? z + (1 / z) : Math.Exp(-0.5 * z * z) / Math.Sqrt(2 * Math.PI) / Above(z);
}
