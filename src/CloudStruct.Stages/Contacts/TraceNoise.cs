using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Contacts;

namespace CloudStruct.Stages.Contacts;

/// <summary>How trace cells scatter about smooth margins: a correlated part, a white part, and what both margins share.</summary>
/// <param name="Noise">Scatter of one cell and its correlation along the sheet.</param>
/// <param name="Shared">Correlation between facing places of the two margins, 0 to 1: undulation of the dike as a whole.</param>
/// <param name="Long">Variance of a slow undulation, as a multiple of the noise's: what leans a whole stretch.</param>
/// <param name="LongRangeM">Its range [m].</param>
internal sealed record TraceNoise(CorrelatedNoise Noise, double Shared, double Long, double LongRangeM)
{
    // Windows cannot show undulation as long as they are; some is always assumed, or cones would claim to know a mean plane
    // from one wave of it.
    private const double LeastLong = 0.2;
    private static readonly double[] WhiteShares = [0.05, 0.2, 0.45, 0.75, 0.95];

    /// <summary>Covariance matrix of cells, row-major, lower triangle.</summary>
    public double[] Covariance(IReadOnlyList<TraceCell> cells)
    {
        int n = cells.Count;
        var k = new double[n * n];
        for (int i = 0; i < n; i++)
        {
            for (int j = 0; j < i; j++) k[(i * n) + j] = Between(cells[i].Margin, cells[i].At, cells[j].Margin, cells[j].At);
            k[(i * n) + i] = Noise.Variance() + (Noise.Sigma * Noise.Sigma * Long);
        }

        return k;
    }

    private double Between(Margin a, SheetPoint pa, Margin b, SheetPoint pb)
    {
        double ds = pa.S - pb.S, dt = pa.T - pb.T, d = Math.Sqrt((ds * ds) + (dt * dt));
        return (Noise.Covariance(d) + (Noise.Sigma * Noise.Sigma * Long * Math.Exp(-d / LongRangeM))) * (a == b ? 1 : Shared);
    }

    /// <summary>Finds range, white share and shared part of greatest residual likelihood over separate stretches, with one
    /// variance for all.</summary>
    /// <param name="stretches">Cells of stretches that do not overlap.</param>
    /// <param name="cellM">Edge of a cell [m]: the shortest range tried.</param>
    /// <param name="windowM">Length of a stretch [m].</param>
    /// <param name="floorM">Smallest standard deviation [m].</param>
    public static TraceNoise Estimate(IReadOnlyList<TraceCell[]> stretches, double cellM, double windowM, double floorM)
    {
        (double Deviance, TraceNoise Noise) best = (double.PositiveInfinity, new TraceNoise(new CorrelatedNoise(Math.Max(floorM, 0.03), 4 * cellM, 0.3), 0.5, LeastLong, windowM / 3));
        void Try(double range, double white, double shared, double slow)
        {
            var unit = new TraceNoise(new CorrelatedNoise(1, range, white), shared, slow, windowM / 3);
            double dets = 0, squares = 0;
            int freedom = 0;
            foreach (TraceCell[] cells in stretches)
            {
                if (StretchFit.Solve(cells, cells.Average(c => c.At.S), unit) is not { } fit) continue;
                int left = cells.Length - fit.Beta.Length;
                if (left < 4) continue;
                dets += fit.LogDeterminants;
                squares += fit.SquareSum;
                freedom += left;
            }

            if (freedom == 0) return;
            double variance = Math.Max(floorM * floorM, squares / freedom);
            double deviance = dets + (freedom * Math.Log(variance)) + (squares / variance);
            if (deviance < best.Deviance) best = (deviance, new TraceNoise(new CorrelatedNoise(Math.Sqrt(variance), range, white), shared, slow, windowM / 3));
        }

        for (double range = cellM; range <= 4 * cellM; range *= 2)
        {
            foreach (double white in WhiteShares) Try(range, white, 0.5, 0.5);
        }

        CorrelatedNoise found = best.Noise.Noise;
        foreach (double slow in (double[])[LeastLong, 1, 2, 4]) Try(found.Range, found.WhiteShare, 0.5, slow);
        foreach (double shared in (double[])[0, 0.25, 0.75, 0.9]) Try(found.Range, found.WhiteShare, shared, best.Noise.Long);
        return best.Noise;
    }
}
