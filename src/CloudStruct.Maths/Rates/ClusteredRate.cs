using CloudStruct.Records.Width;
using MathNet.Numerics.Distributions;

namespace CloudStruct.Maths.Rates;

/// <summary>Rate of events along lines that lie in clusters: neighbouring lines meet the same things.</summary>
public static class ClusteredRate
{
    /// <summary>Mean gap, length over events, with 95 % limits.</summary>
    /// <param name="clusters">Events and length of each cluster.</param>
    /// <param name="independent">Separate things that were met: the error is never less than that of so many gaps of an exponential law.</param>
    /// <remarks>Ratio estimator; its relative variance from the residuals of the clusters, Σ (e - r l)²/(Σ e)² n/(n - 1), limits
    /// in the logarithm by Student's t with n - 1 degrees of freedom. The floor is z/√n (Priest and Hudson 1981, IJRMMS 18,
    /// 183-197, from memory).</remarks>
    public static Estimate? MeanGap(IReadOnlyList<(double Events, double Length)> clusters, int independent)
    {
        double events = clusters.Sum(c => c.Events), length = clusters.Sum(c => c.Length), squares = 0;
        if (!(events > 0) || !(length > 0) || independent < 1) return null;
        double rate = events / length;
        foreach ((double e, double l) in clusters) squares += Math.Pow(e - (rate * l), 2);
        int n = clusters.Count(c => c.Length > 0);
        double between = n > 1 ? squares / (events * events) * n / (n - 1) : 0;
        double t = n > 1 ? StudentT.InvCDF(0, 1, Math.Max(1, Math.Min(n, independent) - 1), 0.975) : 1.96;
        double half = Math.Max(t * Math.Sqrt(between), 1.96 / Math.Sqrt(independent));
        return new Estimate(1 / rate, Math.Exp(-half) / rate, Math.Exp(half) / rate);
    }
}
