using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Directions;

/// <summary>Clusters of axes, their number chosen from the data.</summary>
/// <param name="ClusterOf">Cluster of every axis, 0, 1, ...; -1 when it belongs to none.</param>
/// <param name="Count">Number of clusters.</param>
/// <param name="BicGap">How much worse the best mixture with another number of components is; small means in doubt.</param>
/// <param name="TooWide">Components left out because they are wider than a cluster may be.</param>
/// <param name="Lost">Per cluster: share of its law that lies where axes are given to the background or to a neighbour.</param>
public sealed record AxisClusters(int[] ClusterOf, int Count, double BicGap, int TooWide, double[] Lost)
{
    // The search costs axes × clusters × rounds; three thousand axes fix the number of clusters as well as thirty thousand.
    private const int MostForSearch = 3000;

    /// <summary>Finds clusters by mixtures of Bingham's and of Watson's law on a uniform background: the number of components
    /// with the lowest BIC; components without a valley between them are one cluster; wide ones are none.</summary>
    /// <param name="axes">Unit vectors of either sign.</param>
    /// <param name="weights">As long as the axes, above 0; scaled inside so that they sum to (Σ w)² / Σ w².</param>
    /// <param name="rules">Limits.</param>
    /// <param name="seed">Picks the axes for the search when there are many.</param>
    /// <param name="stop">Cancels.</param>
    public static AxisClusters Find(Vec3[] axes, double[] weights, ClusterRules rules, ulong seed, CancellationToken stop)
    {
        int[] none = new int[axes.Length];
        Array.Fill(none, -1);
        if (axes.Length < rules.FewestAxes) return new AxisClusters(none, 0, double.PositiveInfinity, 0, []);

        (Vec3[] searchAxes, double[] searchWeights) = Pick(axes, Scaled(weights), seed);
        AxisMixture best = AxisMixture.Uniform(searchWeights.Sum(), true);
        var bics = new List<(int Components, double Bic)> { (0, best.Bic) };
        foreach (bool round in new[] { true, false })
        {
            AxisMixture now = AxisMixture.Uniform(searchWeights.Sum(), round);
            double lowest = now.Bic;
            for (int k = 1, worse = 0; k <= rules.MostClusters && worse < 2; k++)
            {
                AxisMixture? next = now.WithOneMore(searchAxes, searchWeights, stop);
                if (next is null) break;
                now = next;
                bics.Add((k, now.Bic));
                if (now.Bic < best.Bic) best = now;
                worse = now.Bic < lowest ? 0 : worse + 1;
                lowest = Math.Min(lowest, now.Bic);
            }
        }

        double gap = bics.Where(b => b.Components != best.Components.Length).Select(b => b.Bic).DefaultIfEmpty(double.PositiveInfinity).Min() - best.Bic;
        if (searchAxes.Length < axes.Length) best = best.Fit(axes, Scaled(weights), stop) ?? best;
        return Settle(best, axes, gap, rules);
    }

    /// <summary>From components to clusters: join, drop what is too wide or too small, assign.</summary>
    private static AxisClusters Settle(AxisMixture mixture, Vec3[] axes, double gap, ClusterRules rules)
    {
        int k = mixture.Components.Length, tooWide = 0;
        int[] cluster = [.. Enumerable.Range(0, k)];
        for (int a = 0; a < k; a++)
        {
            for (int b = a + 1; b < k; b++)
            {
                if (IsWide(mixture.Components[a], rules) || IsWide(mixture.Components[b], rules)) continue;
                if (mixture.Valley(a, b) < rules.DeepestValley) continue;
                int from = Math.Max(cluster[a], cluster[b]), to = Math.Min(cluster[a], cluster[b]);
                for (int c = 0; c < k; c++) if (cluster[c] == from) cluster[c] = to;
            }
        }

        for (int c = 0; c < k; c++)
        {
            if (!IsWide(mixture.Components[c], rules)) continue;
            cluster[c] = -1;
            tooWide++;
        }

        int[] of = new int[axes.Length];
        double[] share = new double[k + 1], joined = new double[k], whole = new double[k], kept = new double[k];
        for (int i = 0; i < axes.Length; i++)
        {
            mixture.Shares(axes[i], share);
            Array.Clear(joined);
            double outside = share[k];
            for (int c = 0; c < k; c++)
            {
                if (cluster[c] >= 0) joined[cluster[c]] += share[c];
                else outside += share[c];
            }

            of[i] = -1;
            for (int c = 0; c < k; c++)
            {
                whole[c] += joined[c];
                if (joined[c] > outside && (of[i] < 0 || joined[c] > joined[of[i]])) of[i] = c;
            }

            if (of[i] >= 0) kept[of[i]] += joined[of[i]];
        }

        // Renumber those that are large enough, in order of first component.
        int count = 0;
        int[] number = new int[k];
        var lost = new List<double>();
        for (int c = 0; c < k; c++)
        {
            number[c] = of.Count(o => o == c) >= rules.FewestAxes ? count++ : -1;
            if (number[c] >= 0) lost.Add(Math.Clamp(1 - (kept[c] / whole[c]), 0, 1));
        }

        for (int i = 0; i < of.Length; i++) of[i] = of[i] < 0 ? -1 : number[of[i]];
        return new AxisClusters(of, count, gap, tooWide, [.. lost]);
    }

    private static bool IsWide(AxisComponent c, ClusterRules rules) => c.SpreadDeg > rules.WidestDeg;

    private static double[] Scaled(double[] weights)
    {
        double sum = weights.Sum(), squares = weights.Sum(w => w * w);
        return [.. weights.Select(w => w * sum / squares)];
    }

    private static (Vec3[] Axes, double[] Weights) Pick(Vec3[] axes, double[] weights, ulong seed)
    {
        if (axes.Length <= MostForSearch) return (axes, weights);
        int[] order = [.. Enumerable.Range(0, axes.Length)];
        double[] keys = [.. order.Select(i => new Draws(seed, 0x5e75, (ulong)i).NextUnit())];
        Array.Sort(keys, order);
        int[] picked = order[..MostForSearch];
        Array.Sort(picked);
        return ([.. picked.Select(i => axes[i])], [.. picked.Select(i => weights[i])]);
    }
}
