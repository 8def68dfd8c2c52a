using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Directions;

/// <summary>Clusters of axes, their number chosen from the data.</summary>
/// <param name="ClusterOf">Cluster of every axis, 0, 1, ...; -1 when it belongs to none.</param>
/// <param name="Count">Number of clusters.</param>
/// <param name="BicGap">How much worse the best mixture with another number of components is; small means in doubt.</param>
/// <param name="IclComponents">Components that ICL would take.</param>
/// <param name="Components">Components that BIC takes, before those without a valley between them are joined.</param>
/// <param name="TooWide">Components left out because they are wider than a cluster may be.</param>
/// <param name="Mixture">One component a cluster, in the order of the clusters, then those that are none.</param>
public sealed record AxisClusters(
    int[] ClusterOf, int Count, double BicGap, int IclComponents, int Components, int TooWide, AxisMixture Mixture)
{
    // The search costs axes × clusters × rounds; so many axes fix the number of clusters as well as all.
    private const int MostForSearch = 1500;

    // A cluster must be worth this much BIC more than its penalty: "very strong" evidence (Kass and Raftery 1995, J. Am. Stat.
    // Assoc. 90, 773-795). With the lowest BIC alone 3 of 100 draws of 30 uniform axes had a cluster.
    private const double CertainGap = 10;

    /// <summary>Finds clusters by mixtures of Bingham's and of Watson's law on a uniform background: the number of components
    /// with the lowest BIC; components without a valley between them are one cluster; wide ones are none.</summary>
    /// <param name="axes">Unit vectors of either sign.</param>
    /// <param name="weights">As long as the axes, above 0; scaled inside so that they sum to (Σ w)² / Σ w².</param>
    /// <param name="rules">Limits.</param>
    /// <param name="seed">Picks the axes for the search when there are many.</param>
    /// <param name="stop">Cancels.</param>
    public static AxisClusters Find(Vec3[] axes, double[] weights, ClusterRules rules, ulong seed, CancellationToken stop) =>
        Find(axes, Scaled(weights), rules, seed, MostForSearch, true, stop);

    /// <summary>The same with weights that are taken as they are, on at most so many axes.</summary>
    /// <param name="axes">Unit vectors of either sign.</param>
    /// <param name="weights">As long as the axes; their sum is the number of observations that counts.</param>
    /// <param name="rules">Limits.</param>
    /// <param name="seed">Picks the axes for the search.</param>
    /// <param name="most">Most axes searched.</param>
    /// <param name="thorough">See <see cref="AxisSearch.Run"/>.</param>
    /// <param name="stop">Cancels.</param>
    public static AxisClusters Find(
        Vec3[] axes, double[] weights, ClusterRules rules, ulong seed, int most, bool thorough, CancellationToken stop)
    {
        int[] none = new int[axes.Length];
        Array.Fill(none, -1);
        if (axes.Length < rules.FewestAxes) return new AxisClusters(none, 0, double.PositiveInfinity, 0, 0, 0, AxisMixture.Uniform(0));

        (Vec3[] searchAxes, double[] searchWeights) = Pick(axes, weights, seed, most);
        AxisSearch search = AxisSearch.Run(searchAxes, searchWeights, rules.MostClusters, thorough, stop);
        AxisMixture best = search.Best;
        if (searchAxes.Length < axes.Length) best = best.Fit(axes, weights, stop) ?? best;
        (AxisMixture joined, int tooWide) = Join(best, axes, weights, rules, stop);
        AxisClusters found = Assign(Proven(joined, axes, weights, rules, stop), axes, rules);
        return found with
        {
            BicGap = search.BicGap, IclComponents = search.IclComponents, Components = search.Best.Components.Length, TooWide = tooWide,
        };
    }

    /// <summary>Scaled so that they sum to their effective number.</summary>
    public static double[] Scaled(double[] weights)
    {
        double sum = weights.Sum(), squares = weights.Sum(w => w * w);
        return [.. weights.Select(w => w * sum / squares)];
    }

    /// <summary>Components between which the density has no valley become one, and the mixture is fitted again.</summary>
    /// <remarks>A core with a halo, or a skewed cluster, takes two components. Its mean is that of one law fitted to both.</remarks>
    private static (AxisMixture Mixture, int TooWide) Join(AxisMixture m, Vec3[] axes, double[] weights, ClusterRules rules, CancellationToken stop)
    {
        while (true)
        {
            (int A, int B) pair = (-1, -1);
            double shallowest = rules.DeepestValley;
            for (int a = 0; a < m.Components.Length; a++)
            {
                for (int b = a + 1; b < m.Components.Length; b++)
                {
                    if (IsWide(m.Components[a], rules) || IsWide(m.Components[b], rules)) continue;
                    double valley = m.Valley(a, b);
                    if (valley >= shallowest) (pair, shallowest) = ((a, b), valley);
                }
            }

            if (pair.A < 0) break;
            AxisComponent one = Both(m.Components[pair.A], m.Components[pair.B]);
            AxisMixture fewer = m with { Components = [.. m.Components.Where((_, c) => c != pair.A && c != pair.B), one] };
            m = fewer.Fit(axes, weights, stop) ?? fewer;
        }

        AxisComponent[] narrow = [.. m.Components.Where(c => !IsWide(c, rules))], wide = [.. m.Components.Where(c => IsWide(c, rules))];
        return (m with { Components = [.. narrow, .. wide] }, wide.Length);
    }

    /// <summary>Takes out narrow components without which the mixture is hardly worse, least evidence first.</summary>
    private static AxisMixture Proven(AxisMixture m, Vec3[] axes, double[] weights, ClusterRules rules, CancellationToken stop)
    {
        while (true)
        {
            AxisMixture? without = null;
            double least = CertainGap;
            for (int c = 0; c < m.Components.Length; c++)
            {
                if (IsWide(m.Components[c], rules)) continue;
                AxisMixture? fewer = m.Without(c, axes, weights, stop);
                if (fewer is not null && fewer.Bic - m.Bic < least) (without, least) = (fewer, fewer.Bic - m.Bic);
            }

            if (without is null) return m;
            AxisComponent[] narrow = [.. without.Components.Where(c => !IsWide(c, rules))], wide = [.. without.Components.Where(c => IsWide(c, rules))];
            m = without with { Components = [.. narrow, .. wide] };
        }
    }

    private static AxisComponent Both(AxisComponent a, AxisComponent b)
    {
        Symmetric3 sum = Tensor(a) + Tensor(b);
        Eigen3 e = (sum * (1 / (a.Share + b.Share))).Eigen();

        // Round only when the two together are.
        return AxisComponent.FromTensor(a.Share + b.Share, e, a.Round && b.Round && e.L2 < 2 * e.L3, 1.5);
    }

    private static Symmetric3 Tensor(AxisComponent c)
    {
        double s2 = Math.Min(0.3, -0.5 / c.KWide), s3 = Math.Min(0.3, -0.5 / c.KNarrow);
        return Symmetric3.Outer(c.Mean, c.Share * (1 - s2 - s3)) + Symmetric3.Outer(c.Wide, c.Share * s2) + Symmetric3.Outer(c.Narrow, c.Share * s3);
    }

    private static AxisClusters Assign(AxisMixture m, Vec3[] axes, ClusterRules rules)
    {
        int k = m.Components.Length;
        int[] of = new int[axes.Length], size = new int[k + 1];
        double[] share = new double[k + 1];
        for (int i = 0; i < axes.Length; i++)
        {
            m.Shares(axes[i], share);
            int best = k;
            double outside = share[k];
            for (int c = 0; c < k; c++) if (IsWide(m.Components[c], rules)) outside += share[c];
            for (int c = 0; c < k; c++) if (!IsWide(m.Components[c], rules) && share[c] > outside && (best == k || share[c] > share[best])) best = c;
            of[i] = best;
            size[best]++;
        }

        int[] order = [.. Enumerable.Range(0, k).OrderBy(c => IsWide(m.Components[c], rules) || size[c] < rules.FewestAxes ? 1 : 0).ThenBy(c => c)];
        int count = order.Count(c => !IsWide(m.Components[c], rules) && size[c] >= rules.FewestAxes);
        int[] number = new int[k + 1];
        Array.Fill(number, -1);
        for (int c = 0; c < count; c++) number[order[c]] = c;
        return new AxisClusters(
            [.. of.Select(o => number[o])], count, 0, 0, 0, 0, m with { Components = [.. order.Select(c => m.Components[c])] });
    }

    private static bool IsWide(AxisComponent c, ClusterRules rules) => c.SpreadDeg > rules.WidestDeg;

    private static (Vec3[] Axes, double[] Weights) Pick(Vec3[] axes, double[] weights, ulong seed, int most)
    {
        if (axes.Length <= most) return (axes, weights);
        int[] order = [.. Enumerable.Range(0, axes.Length)];
        double[] keys = [.. order.Select(i => new Draws(seed, 0x5e75, (ulong)i).NextUnit())];
        Array.Sort(keys, order);
        int[] picked = order[..most];
        Array.Sort(picked);
        return ([.. picked.Select(i => axes[i])], [.. picked.Select(i => weights[i])]);
    }
}
