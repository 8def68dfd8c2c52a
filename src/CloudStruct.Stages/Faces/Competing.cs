using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Faces;

/// <summary>Labels compete for points: each point takes the label of least energy among those around it, planes are refitted,
/// and so on for some rounds.</summary>
/// <remarks>The energy is that of H. Isack and Y. Boykov 2012, Energy-based geometric multi-model fitting: residual, a term
/// for the local normal, Potts cost for unlike neighbours, and a fixed cost for belonging to no plane. Minimised by local
/// moves instead of graph cuts: starting from grown regions the two end alike, and local moves run on all threads. Every
/// round reads the labels of the round before, one half of the points at a time, so the order of work does not matter.</remarks>
internal sealed class Competing
{
    private const double NormalCost = 40;
    private const double OutlierCost = 5;
    private const double PottsCost = 0.4;

    /// <summary>Scale of the residual term over the scatter of the cloud. Below 1: a point one scatter off in a corner
    /// belongs to the other plane more often than not.</summary>
    private const double Sharpness = 0.65;

    private readonly Surface surface;
    private readonly double toleranceM;
    private readonly double precision;   // 1 / (2 s0²)

    public Competing(Surface surface, double scatterM, double toleranceM)
    {
        this.surface = surface;
        this.toleranceM = toleranceM;
        double s0 = Sharpness * scatterM;
        precision = 1 / (2 * s0 * s0);
    }

    /// <summary>Plays some rounds.</summary>
    public void Play(Pieces pieces, double scatterM, int rounds)
    {
        var next = new int[surface.Count];
        for (int round = 0; round < rounds; round++)
        {
            PlaneFit[] planes = [.. pieces.Planes];
            for (int half = 0; half < 2; half++)
            {
                int[] old = pieces.Label;
                BlockParallel.For(surface.Count, surface.Threads, surface.Stop, (from, to) =>
                {
                    for (int i = from; i < to; i++) next[i] = (i & 1) == half ? Best(i, old, planes) : old[i];
                });
                pieces.Label = next;
                next = old;
            }

            pieces.Refit(surface, scatterM, 2);
        }
    }

    private int Best(int i, int[] label, PlaneFit[] planes)
    {
        ReadOnlySpan<int> row = surface.NeighboursOf(i);
        int own = label[i], alike = 0;
        while (alike < row.Length && row[alike] >= 0 && label[row[alike]] == own) alike++;
        if (alike == row.Length || row[alike] < 0)
        {
            // Within a face or within none: four points of five, and nothing to count.
            return own != 0 && PointCost(i, planes[own]) <= OutlierCost + (PottsCost * alike) ? own : 0;
        }

        return Among(i, own, row, label, planes);
    }

    private int Among(int i, int own, ReadOnlySpan<int> row, int[] label, PlaneFit[] planes)
    {
        Span<int> seen = stackalloc int[WorkingCloud.K + 2];
        Span<int> votes = stackalloc int[WorkingCloud.K + 2];
        seen[0] = 0;
        votes[0] = 0;
        int kinds = 1, neighbours = 0;
        if (own != 0)
        {
            seen[kinds] = own;
            votes[kinds++] = 0;
        }

        foreach (int j in row)
        {
            if (j < 0) break;
            neighbours++;
            int l = label[j], k = 0;
            while (k < kinds && seen[k] != l) k++;
            if (k == kinds)
            {
                seen[kinds] = l;
                votes[kinds++] = 0;
            }

            votes[k]++;
        }

        if (kinds == 1) return 0;
        int best = 0;
        double least = OutlierCost + (PottsCost * (neighbours - votes[0]));
        for (int k = 1; k < kinds; k++)
        {
            double cost = PointCost(i, planes[seen[k]]) + (PottsCost * (neighbours - votes[k]));
            if (cost < least || (cost == least && seen[k] == own)) (best, least) = (seen[k], cost);
        }

        return best;
    }

    private double PointCost(int i, in PlaneFit plane)
    {
        double d = surface.Distance(i, plane);
        if (Math.Abs(d) > 2 * toleranceM) return double.PositiveInfinity;
        return (d * d * precision) + (NormalCost * (1 - surface.Agreement(i, plane.Normal)));
    }
}
