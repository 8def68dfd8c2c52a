using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Directions;

/// <summary>A mixture of clusters of axes on a uniform background, fitted by expectation and maximisation.</summary>
/// <param name="Components">The clusters.</param>
/// <param name="BackgroundShare">Weight that belongs to no cluster.</param>
/// <param name="LogLikelihood">Weighted, relative to uniform axes (0 without clusters).</param>
/// <param name="Weight">Sum of weights: the number of observations that the likelihood counts.</param>
/// <param name="Round">True when every cluster has the same spread in all directions.</param>
/// <remarks>Clusters are added one by one where the axes that none explains lie densest, so no random start decides
/// (greedy learning, after Verbeek, Vlassis and Kröse 2003, Neural Comput. 15, 469-485).</remarks>
public sealed record AxisMixture(
    AxisComponent[] Components, double BackgroundShare, double LogLikelihood, double Weight, bool Round)
{
    private const int Rounds = 120;

    // A round that gains less than this is the last [nats]: far below what one more component must gain.
    private const double Gain = 0.01;
    private const double StartSpreadDeg = 7;
    private const double NarrowestDeg = 1.5;

    // Never quite no background: a far axis must be able to belong nowhere.
    private const double LeastBackground = 0.02;

    private static readonly Vec3[] Places = NetPlaces(20);

    /// <summary>Free parameters: share, two of the mean, and one (round) or three of the shape.</summary>
    public int Parameters => Components.Length * (Round ? 4 : 6);

    /// <summary>-2 ln L + parameters · ln(weight): lower is better.</summary>
    public double Bic => (-2 * LogLikelihood) + (Parameters * Math.Log(Math.Max(2, Weight)));

    /// <summary>No cluster.</summary>
    public static AxisMixture Uniform(double weight, bool round) => new([], 1, 0, weight, round);

    /// <summary>The best mixture with one cluster more, from the densest places of what is not explained yet; null when no
    /// such cluster survives.</summary>
    /// <param name="axes">Unit vectors of either sign.</param>
    /// <param name="weights">As long as the axes.</param>
    /// <param name="stop">Cancels.</param>
    public AxisMixture? WithOneMore(Vec3[] axes, double[] weights, CancellationToken stop)
    {
        AxisMixture? best = null;
        foreach (Vec3 start in Densest(axes, weights, 3))
        {
            stop.ThrowIfCancellationRequested();
            var fresh = AxisComponent.FromTensor(
                BackgroundShare / 2, Blob(start), Round, NarrowestDeg);
            AxisMixture? m = (this with { Components = [.. Components, fresh], BackgroundShare = BackgroundShare / 2 }).Fit(axes, weights, stop);
            if (m is not null && (best is null || m.LogLikelihood > best.LogLikelihood + 1e-9)) best = m;
        }

        return best;
    }

    /// <summary>Improves all clusters together; null when one of them dies.</summary>
    /// <param name="axes">Unit vectors of either sign.</param>
    /// <param name="weights">As long as the axes.</param>
    /// <param name="stop">Cancels.</param>
    public AxisMixture? Fit(Vec3[] axes, double[] weights, CancellationToken stop)
    {
        int k = Components.Length;
        AxisMixture now = this;
        double total = weights.Sum(), before = double.NegativeInfinity;
        double[] share = new double[k + 1];
        for (int round = 0; round < Rounds; round++)
        {
            stop.ThrowIfCancellationRequested();
            double logL = 0, background = 0;
            var tensors = new Symmetric3[k];
            double[] sums = new double[k];
            for (int i = 0; i < axes.Length; i++)
            {
                logL += weights[i] * now.Shares(axes[i], share);
                for (int c = 0; c < k; c++)
                {
                    double r = weights[i] * share[c];
                    sums[c] += r;
                    tensors[c] += Symmetric3.Outer(axes[i], r);
                }

                background += weights[i] * share[k];
            }

            double left = Math.Max(LeastBackground, background / total), scale = (1 - left) / Math.Max(1e-12, 1 - (background / total));
            var components = new AxisComponent[k];
            for (int c = 0; c < k; c++)
            {
                if (sums[c] < 2) return null;
                components[c] = AxisComponent.FromTensor(
                    sums[c] / total * scale, (tensors[c] * (1 / sums[c])).Eigen(), Round, NarrowestDeg);
            }

            bool done = logL - before < Gain;
            before = logL;
            now = now with { Components = components, BackgroundShare = left, LogLikelihood = logL, Weight = total };
            if (done) break;
        }

        return now;
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
            share[c] = Components[c].Share * Math.Exp(Components[c].LogDensity(axis));
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
        double summitA = Density(from, a, b), summitB = Density(to, a, b), lowest = double.PositiveInfinity;
        double highestA = summitA, highestB = summitB;
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

    /// <summary>The places on the net with most unexplained weight within a start's spread, none near another.</summary>
    private List<Vec3> Densest(Vec3[] axes, double[] weights, int count)
    {
        double[] share = new double[Components.Length + 1], rest = new double[axes.Length];
        for (int i = 0; i < axes.Length; i++)
        {
            Shares(axes[i], share);
            rest[i] = weights[i] * share[^1];
        }

        double k = 0.5 / Math.Pow(StartSpreadDeg * Math.PI / 180, 2), near = Math.Cos(2 * StartSpreadDeg * Math.PI / 180);
        double[] sums = new double[Places.Length];
        for (int p = 0; p < Places.Length; p++)
        {
            for (int i = 0; i < axes.Length; i++)
            {
                double c = axes[i].Dot(Places[p]), e = k * ((c * c) - 1);
                if (e > -12) sums[p] += rest[i] * Math.Exp(e);
            }
        }

        var found = new List<Vec3>();
        while (found.Count < count)
        {
            int best = -1;
            for (int p = 0; p < sums.Length; p++)
            {
                if (found.Exists(f => Math.Abs(f.Dot(Places[p])) > near)) continue;
                if (best < 0 || sums[p] > sums[best]) best = p;
            }

            if (best < 0 || sums[best] <= 0) break;
            found.Add(Places[best]);
        }

        return found;
    }

    private static Eigen3 Blob(Vec3 mean)
    {
        double s = Math.Pow(Math.Sin(StartSpreadDeg * Math.PI / 180), 2);
        (Vec3 e1, Vec3 e2) = Tangent.Axes(mean);
        return new Eigen3(1 - (2 * s), s, s, mean, e1, e2);
    }

    private static Vec3[] NetPlaces(int steps)
    {
        var places = new List<Vec3>();
        for (int j = -steps; j <= steps; j++)
        {
            for (int i = -steps; i <= steps; i++)
            {
                var p = new Point2((double)i / steps, (double)j / steps);
                if ((p.X * p.X) + (p.Y * p.Y) <= 1) places.Add(EqualAreaNet.Direction(p));
            }
        }

        return [.. places];
    }
}
