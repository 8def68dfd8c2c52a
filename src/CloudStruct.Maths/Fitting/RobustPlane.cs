using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Fitting;

/// <summary>Orthogonal planes that outliers do not move: a start that bears nearly half of them, then an efficient refit.</summary>
/// <remarks>MM estimate (V. J. Yohai 1987, High breakdown-point and high efficiency robust estimates for regression) with
/// orthogonal distances: S scale with Tukey's bisquare 1.547 and breakdown 0.5 from random triplets and concentration steps
/// (P. J. Rousseeuw 1984, Least median of squares regression), then bisquare 4.685 with that scale held.</remarks>
public static class RobustPlane
{
    /// <summary>Constant of the start: half the points may be outliers.</summary>
    public const double StartConstant = 1.547;

    /// <summary>Constant of the refit: 95 % of the efficiency of least squares under normal errors.</summary>
    public const double RefitConstant = 4.685;

    // Enough triplets that with half the points outliers one triplet in a million runs of them is not clean.
    private static readonly int Trials = TrialsNeeded(0.5, 0.999999);
    private const int ScoredPoints = 600;
    private const ulong Purpose = 0x706C616E65;

    /// <summary>MM plane of places with gross outliers among them.</summary>
    /// <param name="places">At least four, not all in a line.</param>
    /// <param name="seed">Seed of the triplets.</param>
    /// <returns>The plane, and the robust scale of the distances [m]. Fewer than four places: the plain fit, scale 0.</returns>
    public static (PlaneFit Plane, double ScaleM) FitMm(ReadOnlySpan<Vec3> places, ulong seed)
    {
        if (places.Length < 4) return (PlaneFit.To(places), 0);
        Vec3[] scored = Sample(places, seed);
        var distance = new double[scored.Length];
        PlaneFit best = PlaneFit.To(places);
        double bestScale = double.PositiveInfinity;
        for (int t = 0; t < Trials; t++)
        {
            var draws = new Draws(seed, Purpose, (ulong)t);
            Vec3 a = scored[draws.NextBelow(scored.Length)], b = scored[draws.NextBelow(scored.Length)], c = scored[draws.NextBelow(scored.Length)];
            Vec3 n = (b - a).Cross(c - a);
            if (!(n.Length > 1e-12 * (b - a).Length * (c - a).Length)) continue;
            PlaneFit plane = PlaneFit.To([a, b, c]);
            for (int step = 0; step < 3; step++) plane = NearerHalf(scored, plane, distance);
            double scale = Scale(scored, plane, distance);
            if (scale < bestScale) (best, bestScale) = (plane, scale);
        }

        if (double.IsInfinity(bestScale)) bestScale = 0;
        return (Refit(places, best, bestScale), bestScale);
    }

    /// <summary>Bisquare refit by reweighted orthogonal least squares, from a start and with the scale held.</summary>
    /// <param name="places">Places, outliers included.</param>
    /// <param name="start">A plane near the wanted one.</param>
    /// <param name="scaleM">Standard deviation of good points; 0 leaves the start as it is.</param>
    /// <param name="rounds">Most rounds.</param>
    public static PlaneFit Refit(ReadOnlySpan<Vec3> places, PlaneFit start, double scaleM, int rounds = 50)
    {
        if (!(scaleM > 0)) return start;
        PlaneFit plane = start;
        double limit = RefitConstant * scaleM;
        for (int round = 0; round < rounds; round++)
        {
            var sums = new Moments(plane.Centroid);
            sums.AddNear(places, plane, limit);
            if (!(sums.Weight > 3)) return plane;
            PlaneFit next = PlaneFit.From(sums);
            double turn = next.Normal.Cross(plane.Normal).Length, shift = Math.Abs(next.Distance(plane.Centroid));
            plane = next;
            if (turn < 1e-8 && shift < 1e-6 * scaleM) break;
        }

        return plane;
    }

    /// <summary>Random triplets after which one without an outlier was drawn with the wanted probability.</summary>
    /// <param name="outlierShare">Share of outliers, 0 to 1.</param>
    /// <param name="probability">Wanted probability, below 1.</param>
    /// <remarks>ln(1 - p) / ln(1 - w³): M. A. Fischler and R. C. Bolles 1981, Random sample consensus.</remarks>
    public static int TrialsNeeded(double outlierShare, double probability)
    {
        double clean = Math.Pow(1 - outlierShare, 3);
        if (clean >= 1) return 1;
        if (!(clean > 0)) return int.MaxValue;
        return (int)Math.Min(int.MaxValue, Math.Ceiling(Math.Log(1 - probability) / Math.Log(1 - clean)));
    }

    /// <summary>Tukey's bisquare weight: (1 - q²)² inside 1, else 0.</summary>
    /// <param name="q">Distance over the limit.</param>
    public static double Weight(double q)
    {
        double k = 1 - (q * q);
        return k > 0 ? k * k : 0;
    }

    private static Vec3[] Sample(ReadOnlySpan<Vec3> places, ulong seed)
    {
        if (places.Length <= ScoredPoints) return places.ToArray();
        var sample = new Vec3[ScoredPoints];
        for (int i = 0; i < sample.Length; i++) sample[i] = places[new Draws(seed, Purpose + 1, (ulong)i).NextBelow(places.Length)];
        return sample;
    }

    // A concentration step: least squares on the half of the points that lies nearest.
    private static PlaneFit NearerHalf(Vec3[] places, PlaneFit plane, double[] distance)
    {
        for (int i = 0; i < places.Length; i++) distance[i] = Math.Abs(plane.Distance(places[i]));
        Array.Sort(distance);
        double limit = distance[(places.Length + 3) / 2];
        var sums = new Moments(plane.Centroid);
        foreach (Vec3 p in places)
        {
            if (Math.Abs(plane.Distance(p)) <= limit) sums.Add(p.X, p.Y, p.Z);
        }

        return PlaneFit.From(sums);
    }

    // Solves mean rho(d / s) = 1/2 by fixed point; rho is the bisquare loss scaled to 1.
    private static double Scale(Vec3[] places, PlaneFit plane, double[] distance)
    {
        for (int i = 0; i < places.Length; i++) distance[i] = Math.Abs(plane.Distance(places[i]));
        Array.Sort(distance);
        double s = distance[distance.Length / 2] / 0.6745;
        if (!(s > 0)) return 0;
        for (int round = 0; round < 100; round++)
        {
            double sum = 0;
            foreach (double d in distance)
            {
                double q = d / (StartConstant * s), k = 1 - (q * q);
                sum += k > 0 ? 1 - (k * k * k) : 1;
            }

            double next = s * Math.Sqrt(2 * sum / distance.Length);
            if (Math.Abs(next - s) < 1e-9 * s) return next;
            s = next;
        }

        return s;
    }
}
