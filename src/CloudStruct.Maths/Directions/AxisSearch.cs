using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Directions;

/// <summary>What the search for the number of clusters came to.</summary>
/// <param name="Best">Mixture with the lowest BIC.</param>
/// <param name="BicGap">How much worse the best mixture with another number of components is.</param>
/// <param name="IclComponents">Number of components that ICL, which also asks for clear borders, would take.</param>
public sealed record AxisSearch(AxisMixture Best, double BicGap, int IclComponents)
{
    /// <summary>Searches.</summary>
    /// <param name="axes">Unit vectors of either sign.</param>
    /// <param name="weights">As long as the axes; their sum is the number of observations that counts.</param>
    /// <param name="most">Most components.</param>
    /// <param name="thorough">False: round clusters only, without the second look at laws and superfluous clusters.</param>
    /// <param name="stop">Cancels.</param>
    public static AxisSearch Run(Vec3[] axes, double[] weights, int most, bool thorough, CancellationToken stop)
    {
        var all = new List<AxisMixture> { AxisMixture.Uniform(weights.Sum()) };
        Grow(all, all[0], axes, weights, true, most, stop);
        if (thorough)
        {
            Grow(all, all[0], axes, weights, false, most, stop);
            for (bool better = true; better;)
            {
                better = false;
                AxisMixture best = Lowest(all);
                foreach (AxisMixture m in Neighbours(best, axes, weights, stop))
                {
                    all.Add(m);
                    if (m.Bic < best.Bic - 1e-6) better = true;
                }

                // Where a law has changed, one more cluster may have become visible.
                if (better) Grow(all, Lowest(all), axes, weights, true, most, stop);
            }
        }

        AxisMixture chosen = Lowest(all);
        double gap = all.Where(m => m.Components.Length != chosen.Components.Length).Select(m => m.Bic).DefaultIfEmpty(double.PositiveInfinity).Min() - chosen.Bic;
        int icl = all.Select(m => m.WithEntropy(axes, weights)).MinBy(m => m.Icl)!.Components.Length;
        return new AxisSearch(chosen, gap, icl);
    }

    private static AxisMixture Lowest(List<AxisMixture> all) => all.MinBy(m => m.Bic)!;

    /// <summary>Adds clusters until two in a row did not pay.</summary>
    private static void Grow(List<AxisMixture> all, AxisMixture from, Vec3[] axes, double[] weights, bool round, int most, CancellationToken stop)
    {
        AxisMixture now = from;
        double lowest = now.Bic;
        for (int worse = 0; now.Components.Length < most && worse < 2;)
        {
            AxisMixture? next = now.WithOneMore(axes, weights, round, stop);
            if (next is null) return;
            now = next;
            all.Add(now);
            worse = now.Bic < lowest ? 0 : worse + 1;
            lowest = Math.Min(lowest, now.Bic);
        }
    }

    private static IEnumerable<AxisMixture> Neighbours(AxisMixture m, Vec3[] axes, double[] weights, CancellationToken stop)
    {
        for (int c = 0; c < m.Components.Length; c++)
        {
            if (m.WithOtherLaw(c, axes, weights, stop) is { } other) yield return other;
            if (m.Without(c, axes, weights, stop) is { } fewer) yield return fewer;
        }
    }
}
