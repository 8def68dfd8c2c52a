using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Faces;

/// <summary>Cuts labels into connected fragments and joins neighbouring fragments that are one plane.</summary>
/// <remarks>Two fragments are one plane when offset and slopes differ by no more than their errors allow, errors taken as
/// correlated over the noise length: with independent errors every large face would stay in pieces.</remarks>
internal sealed class Joining
{
    // chi-square of 3 degrees of freedom is above 11.3 once in a hundred. A once in a thousand joined more neighbours of slightly
    // different planes (2.7 % of faces against 2.4 %) and spared no piece.
    private const double Limit = 11.3;

    // Geology beside noise: joints undulate, so that two halves of one face may differ by so much although both are well known.
    private const double SlopeTolerance = 0.6 * Math.PI / 180;
    private const double OffsetToleranceShare = 0.35;

    // Beyond this a pair is never one plane, however poorly its pieces are known.
    private const double MostTurnDeg = 8;

    private readonly Surface surface;
    private readonly double scatterM;
    private readonly double noiseLengthM;

    public Joining(Surface surface, double scatterM, double noiseLengthM)
    {
        this.surface = surface;
        this.scatterM = scatterM;
        this.noiseLengthM = noiseLengthM;
    }

    /// <summary>Cuts, joins, drops what stays smaller than half the smallest face.</summary>
    public void Into(Pieces pieces)
    {
        int[] parent = Cut(pieces);
        var sums = Sums(pieces);
        List<(int A, int B)> near = Nearness.Pairs(surface, pieces.Label, surface.GapM);
        var into = new int[pieces.Count];
        for (int k = 0; k < into.Length; k++) into[k] = k;
        for (int round = 0; round < 5; round++)
        {
            if (!JoinOnce(pieces, parent, sums, near, into)) break;
            near = [.. near.Select(p => (A: into[p.A], B: into[p.B])).Where(p => p.A != p.B).Select(p => p.A < p.B ? p : (p.B, p.A)).Distinct()];
            near.Sort();
        }

        int[] joined = pieces.Label;
        BlockParallel.For(joined.Length, surface.Threads, surface.Stop, (from, to) =>
        {
            for (int i = from; i < to; i++) joined[i] = into[joined[i]];
        });
        pieces.Compact(surface.SmallestPoints, surface.Threads);
        pieces.Refit(surface, scatterM, 3);
    }

    // Relabels by connected component of the graph; gives the label that each fragment came from.
    private int[] Cut(Pieces pieces)
    {
        int[] label = pieces.Label;
        pieces.Sort(surface.Threads);

        // Label by label, each fragment named by its first point plus 1; then numbered in the order of those points.
        var first = new int[label.Length];
        BlockParallel.For(
            pieces.Count,
            surface.Threads,
            surface.Stop,
            () => new Stack<int>(),
            (from, to, stack) =>
            {
                for (int k = Math.Max(1, from); k < to; k++)
                {
                    foreach (int s in pieces.Of(k))
                    {
                        if (first[s] == 0) Flood(s, label, first, stack);
                    }
                }
            },
            length: 8);
        var planes = new List<PlaneFit> { default };
        var parent = new List<int> { 0 };
        var number = new int[label.Length];
        for (int s = 0; s < label.Length; s++)
        {
            if (first[s] != s + 1) continue;
            number[s] = planes.Count;
            planes.Add(pieces.Planes[label[s]]);
            parent.Add(label[s]);
        }

        var fragment = new int[label.Length];
        BlockParallel.For(label.Length, surface.Threads, surface.Stop, (from, to) =>
        {
            for (int i = from; i < to; i++) fragment[i] = first[i] == 0 ? 0 : number[first[i] - 1];
        });

        pieces.Label = fragment;
        pieces.Planes.Clear();
        pieces.Planes.AddRange(planes);
        return [.. parent];
    }

    private void Flood(int start, int[] label, int[] first, Stack<int> stack)
    {
        int own = label[start];
        first[start] = start + 1;
        stack.Push(start);
        while (stack.Count > 0)
        {
            foreach (int j in surface.NeighboursOf(stack.Pop()))
            {
                if (j < 0) break;
                if (label[j] != own || first[j] != 0) continue;
                first[j] = start + 1;
                stack.Push(j);
            }
        }
    }

    private Moments[] Sums(Pieces pieces)
    {
        pieces.Sort(surface.Threads);
        var sums = new Moments[pieces.Count];
        Vec3 shift = pieces.Label.Length > 0 ? surface.Place(0) : default;   // one shift for all, so that sums can be added
        BlockParallel.For(
            sums.Length,
            surface.Threads,
            surface.Stop,
            (from, to) =>
            {
                for (int k = from; k < to; k++)
                {
                    sums[k] = new Moments(shift);
                    if (k > 0) sums[k].Add(surface.X, surface.Y, surface.Z, pieces.Of(k));
                }
            },
            length: 8);

        return sums;
    }

    // Joins each label with at most one other, the surest pairs first.
    private bool JoinOnce(Pieces pieces, int[] parent, Moments[] sums, List<(int A, int B)> near, int[] into)
    {
        var candidates = new List<(double Cost, int A, int B)>();
        foreach ((int a, int b) in near)
        {
            double cost = Cost(parent[a] == parent[b], pieces.Planes[a], pieces.Planes[b], sums[a], sums[b]);
            if (cost < Limit) candidates.Add((cost, a, b));
        }

        candidates.Sort();
        var busy = new bool[pieces.Count];
        var step = new Dictionary<int, int>();
        foreach ((_, int a, int b) in candidates)
        {
            if (busy[a] || busy[b]) continue;
            busy[a] = busy[b] = true;
            (int keep, int drop) = sums[a].Weight >= sums[b].Weight ? (a, b) : (b, a);
            step[drop] = keep;
            sums[keep].Add(sums[drop]);
            pieces.Planes[keep] = PlaneFit.From(sums[keep]);
        }

        for (int k = 0; k < into.Length; k++) into[k] = step.GetValueOrDefault(into[k], into[k]);
        return step.Count > 0;
    }

    private double Cost(bool sameParent, PlaneFit a, PlaneFit b, in Moments sumA, in Moments sumB)
    {
        // Splinters carry no plane of their own: they only go back to what they broke from.
        if (sumA.Weight < 12 || sumB.Weight < 12) return sameParent ? 0 : double.PositiveInfinity;
        (PlaneFit big, PlaneFit small) = sumA.Weight >= sumB.Weight ? (a, b) : (b, a);
        double turn = big.Normal.Cross(small.Normal).Length;
        if (turn > Math.Sin(MostTurnDeg * Math.PI / 180)) return double.PositiveInfinity;

        // In the frame of the larger, about the middle of the smaller, where offset and slopes of the smaller are independent.
        Vec3 n = big.Normal, m = small.Normal.Dot(n) < 0 ? -small.Normal : small.Normal;
        Vec3 e1 = big.Eigen.V1, e2 = n.Cross(e1);
        double offset = big.Distance(small.Centroid), slope1 = -m.Dot(e1), slope2 = -m.Dot(e2);
        Vec3 d = small.Centroid - big.Centroid;
        double vs = MeanVariance(small), vb = MeanVariance(big);
        double l1 = Math.Max(big.Eigen.L1, 1e-12), l2 = Math.Max(big.Eigen.L2, 1e-12);
        double u = d.Dot(e1), v = d.Dot(e2);
        double offsetVariance = vs + (vb * (1 + (u * u / l1) + (v * v / l2))) + Square(OffsetToleranceShare * scatterM);
        double s1 = (vs / Along(small, e1)) + (vb / l1) + Square(SlopeTolerance);
        double s2 = (vs / Along(small, e2)) + (vb / l2) + Square(SlopeTolerance);
        return (offset * offset / offsetVariance) + (slope1 * slope1 / s1) + (slope2 * slope2 / s2);
    }

    // Variance of the mean of correlated errors: a patch holds about area / (2 pi L²) independent ones.
    private double MeanVariance(in PlaneFit fit)
    {
        double area = fit.Count * surface.PointAreaM2, cell = 2 * Math.PI * noiseLengthM * noiseLengthM;
        return scatterM * scatterM * Math.Min(1, Math.Max(1 / fit.Count, cell / area));
    }

    private static double Along(in PlaneFit fit, Vec3 direction)
    {
        double c1 = fit.Eigen.V1.Dot(direction), c2 = fit.Eigen.V2.Dot(direction);
        return Math.Max(1e-12, (fit.Eigen.L1 * c1 * c1) + (fit.Eigen.L2 * c2 * c2));
    }

    private static double Square(double x) => x * x;
}
