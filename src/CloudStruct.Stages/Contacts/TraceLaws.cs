using CloudStruct.Maths.Fitting;

namespace CloudStruct.Stages.Contacts;

/// <summary>The laws of scatter that a dike's traces allow, each with its probability.</summary>
/// <param name="Laws">The likeliest, in falling order.</param>
/// <remarks>A few waves of a margin do not fix how long and how high they are. One best law makes cones too small where it
/// happens to find short or low waves; results are averaged over all laws by their residual likelihood (Patterson and Thompson
/// 1971; Hoeting et al. 1999, Bayesian model averaging, both from memory).</remarks>
internal sealed record TraceLaws((TraceNoise Noise, double Weight)[] Laws)
{
    private const int LargestSet = 150;      // cells: the cost grows with the cube
    private const int LargestCount = 10;
    private const double LeastWeight = 0.01;
    private static readonly double[] WhiteShares = [0.05, 0.3, 0.6, 0.9];
    private static readonly double[] Waves = [0.4, 1.5, 5, 16, 50];
    private static readonly double[] Sharings = [0.1, 0.5, 0.85];

    /// <summary>Lengths of the undulation that are tried, as shares of the window. Shorter ones were tried: what is that short is the
    /// classifier's wander, and taken for the margin's own shape it counts as known.</summary>
    private static readonly double[] WaveLengths = [1 / 4.5, 1 / 2.5, 1 / 1.5];

    // For widths, which follow a trace over a metre or two, whatever bends it.
    private static readonly double[] ShortWaveLengths = [1.0 / 14, 1.0 / 8, .. WaveLengths];

    /// <summary>The likeliest law.</summary>
    public TraceNoise Best => Laws[0].Noise;

    /// <summary>Averages over separate stretches with one set of laws for all.</summary>
    /// <param name="stretches">Cells of stretches that do not overlap.</param>
    /// <param name="cellM">Edge of a cell [m]: the shortest range tried.</param>
    /// <param name="windowM">Length over which attitudes are wanted [m].</param>
    /// <param name="floorM">Smallest standard deviation of the errors [m].</param>
    /// <param name="shortWaves">Whether waves of a tenth of the window are tried too.</param>
    public static TraceLaws Estimate(IReadOnlyList<TraceCell[]> stretches, double cellM, double windowM, double floorM, bool shortWaves = false)
    {
        TraceCell[][] sets = [.. stretches.Select(Thinned)];
        (double Deviance, TraceNoise Noise) best = (double.PositiveInfinity, new TraceNoise(new CorrelatedNoise(Math.Max(floorM, 0.02), 2 * cellM, 0.3), 0.5, 2, windowM / 8));
        foreach (double range in (double[])[cellM, 2 * cellM, 4 * cellM, 8 * cellM])
        {
            foreach (double white in WhiteShares)
            {
                foreach (double wave in (double[])[0.4, 5]) Keep(ref best, Judge(sets, floorM, range, white, wave, windowM / 8, 0.5));
            }
        }

        if (double.IsInfinity(best.Deviance)) return new TraceLaws([(best.Noise, 1)]);
        CorrelatedNoise found = best.Noise.Noise;
        var all = new List<(double Deviance, TraceNoise Noise)>();
        foreach (double wave in Waves)
        {
            foreach (double length in shortWaves ? ShortWaveLengths : WaveLengths)
            {
                foreach (double shared in Sharings)
                {
                    if (Judge(sets, floorM, found.Range, found.WhiteShare, wave, windowM * length, shared) is { } one) all.Add(one);
                }
            }
        }

        double least = all.Min(a => a.Deviance);
        (TraceNoise Noise, double Weight)[] kept = [.. all.Select(a => (a.Noise, Weight: Math.Exp((least - a.Deviance) / 2))).OrderByDescending(a => a.Weight)
            .Take(LargestCount).Where(a => a.Weight > LeastWeight)];
        double total = kept.Sum(k => k.Weight);
        return new TraceLaws([.. kept.Select(k => (k.Noise, k.Weight / total))]);
    }

    private static void Keep(ref (double Deviance, TraceNoise Noise) best, (double Deviance, TraceNoise Noise)? one)
    {
        if (one is { } o && o.Deviance < best.Deviance) best = o;
    }

    // Twice the negative logarithm of the residual likelihood, the variance set to its best.
    private static (double Deviance, TraceNoise Noise)? Judge(TraceCell[][] sets, double floorM, double range, double white, double wave, double waveRange, double shared)
    {
        var unit = new TraceNoise(new CorrelatedNoise(1, range, white), shared, wave, waveRange);
        double dets = 0, squares = 0;
        int freedom = 0;
        foreach (TraceCell[] cells in sets)
        {
            if (MarginModel.Solve(cells, cells.Average(c => c.At.S), unit) is not { } fit) continue;
            int left = cells.Length - fit.Beta.Length;
            if (left < 4) continue;
            dets += fit.LogDeterminants;
            squares += fit.SquareSum;
            freedom += left;
        }

        if (freedom == 0) return null;
        double variance = Math.Max(floorM * floorM, squares / freedom);
        double deviance = dets + (freedom * Math.Log(variance)) + (squares / variance);
        return double.IsFinite(deviance) ? (deviance, new TraceNoise(new CorrelatedNoise(Math.Sqrt(variance), range, white), shared, wave, waveRange)) : null;
    }

    // Every k-th pair of neighbours: both the shortest and the longest distances stay.
    private static TraceCell[] Thinned(TraceCell[] cells)
    {
        int k = (cells.Length + LargestSet - 1) / LargestSet;
        return k <= 1 ? cells : [.. cells.Where((_, i) => i / 2 % k == 0)];
    }
}
