using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Directions;

/// <summary>A mixture of clusters of axes on a uniform background, fitted by expectation and maximisation.</summary>
/// <param name="Components">The clusters.</param>
/// <param name="BackgroundShare">Weight that belongs to no cluster.</param>
/// <param name="LogLikelihood">Weighted, relative to uniform axes (0 without clusters).</param>
/// <param name="Weight">Sum of weights: the number of observations that the likelihood counts.</param>
/// <param name="Entropy">Weighted entropy of the shares of each axis among clusters and background [nats]; 0 when all borders are clear.</param>
public sealed partial record AxisMixture(
    AxisComponent[] Components, double BackgroundShare, double LogLikelihood, double Weight, double Entropy)
{
    /// <summary>Rounds after which a fit is taken as it is.</summary>
    public const int MostRounds = 120;

    // A round that gains less than this is the last [nats]: far below what one more component must gain.
    private const double Gain = 0.005;
    private const double NarrowestDeg = 1.5;

    // Never quite no background: a far axis must be able to belong nowhere.
    private const double LeastBackground = 0.02;

    // exp(-30): what a component gives to an axis that far out changes no digit of its share.
    private const double Far = -30;

    /// <summary>Free parameters of all clusters.</summary>
    public int Parameters => Components.Sum(c => c.Parameters);

    /// <summary>-2 ln L + parameters · ln(weight): lower is better.</summary>
    public double Bic => (-2 * LogLikelihood) + (Parameters * Math.Log(Math.Max(2, Weight)));

    /// <summary>BIC plus twice the entropy of the shares: asks also for clear borders (Biernacki, Celeux and Govaert 2000,
    /// IEEE Trans. Pattern Anal. Mach. Intell. 22, 719-725, from memory).</summary>
    public double Icl => Bic + (2 * Entropy);

    /// <summary>No cluster.</summary>
    public static AxisMixture Uniform(double weight) => new([], 1, 0, weight, 0);

    /// <summary>Improves all clusters together; null when one of them dies.</summary>
    /// <param name="axes">Unit vectors of either sign.</param>
    /// <param name="weights">As long as the axes.</param>
    /// <param name="stop">Cancels.</param>
    /// <param name="rounds">Most rounds.</param>
    public AxisMixture? Fit(Vec3[] axes, double[] weights, CancellationToken stop, int rounds = MostRounds)
    {
        int k = Components.Length;
        AxisMixture now = this;
        double total = 0, before = double.NegativeInfinity;
        foreach (double w in weights) total += w;
        double[] share = new double[k + 1], sums = new double[k];
        var tensors = new Symmetric3[k];
        for (int round = 0; round < rounds; round++)
        {
            stop.ThrowIfCancellationRequested();
            double logL = 0, background = 0;
            Array.Clear(tensors);
            Array.Clear(sums);
            for (int i = 0; i < axes.Length; i++)
            {
                logL += weights[i] * now.Shares(axes[i], share);
                for (int c = 0; c < k; c++)
                {
                    double r = weights[i] * share[c];
                    if (r == 0) continue;
                    sums[c] += r;
                    tensors[c] += Symmetric3.Outer(axes[i], r);
                }

                background += weights[i] * share[k];
            }

            if (logL - before < Gain) return now with { LogLikelihood = logL, Weight = total };
            before = logL;
            double left = Math.Max(LeastBackground, background / total), scale = (1 - left) / Math.Max(1e-12, 1 - (background / total));
            var components = new AxisComponent[k];
            for (int c = 0; c < k; c++)
            {
                if (sums[c] < 2) return null;
                components[c] = AxisComponent.FromTensor(
                    sums[c] / total * scale, (tensors[c] * (1 / sums[c])).Eigen(), now.Components[c].Round, NarrowestDeg);
            }

            now = now with { Components = components, BackgroundShare = left, LogLikelihood = logL, Weight = total };
        }

        return now;
    }

    /// <summary>The same with its entropy.</summary>
    /// <param name="axes">Unit vectors of either sign.</param>
    /// <param name="weights">As long as the axes.</param>
    public AxisMixture WithEntropy(Vec3[] axes, double[] weights)
    {
        double[] share = new double[Components.Length + 1];
        double entropy = 0;
        for (int i = 0; i < axes.Length; i++)
        {
            Shares(axes[i], share);
            foreach (double s in share) if (s > 1e-12) entropy -= weights[i] * s * Math.Log(s);
        }

        return this with { Entropy = entropy };
    }

    /// <summary>Posterior shares of one axis among the clusters, the background last.</summary>
    /// <param name="axis">Unit vector of either sign.</param>
    /// <param name="share">[out] one longer than the clusters.</param>
    /// <returns>ln of the density of the whole mixture over uniform.</returns>
    public double Shares(Vec3 axis, Span<double> share)
    {
        double sum = BackgroundShare;
        for (int c = 0; c < Components.Length; c++)
        {
            double log = Components[c].LogDensity(axis);
            share[c] = log > Far ? Components[c].Share * Math.Exp(log) : 0;
            sum += share[c];
        }

        share[Components.Length] = BackgroundShare;
        for (int c = 0; c <= Components.Length; c++) share[c] /= sum;
        return Math.Log(sum);
    }

    /// <summary>How shallow the valley between two clusters is: lowest density on the way from mean to mean, over the density
    /// at the lower of the two summits. 1 when there is no valley.</summary>
    public double Valley(int a, int b)
    {
        Vec3 from = Components[a].Mean, to = Components[b].Mean;
        if (from.Dot(to) < 0) to = -to;
        double lowest = double.PositiveInfinity, highestA = Density(from, a, b), highestB = Density(to, a, b);
        for (int i = 0; i <= 40; i++)
        {
            double d = Density(((from * (40 - i)) + (to * i)).Unit(), a, b);
            lowest = Math.Min(lowest, d);
            if (i < 20) highestA = Math.Max(highestA, d);
            else highestB = Math.Max(highestB, d);
        }

        return lowest / Math.Min(highestA, highestB);
    }

    private double Density(Vec3 axis, int a, int b) => BackgroundShare
        + (Components[a].Share * Math.Exp(Components[a].LogDensity(axis)))
        + (Components[b].Share * Math.Exp(Components[b].LogDensity(axis)));
}
