using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Fitting;
using CloudStruct.Maths.Kernels;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;

namespace CloudStruct.Stages.Describe;

/// <summary>Scatter over wide radii, one value per small cell: roughness, planarity, and which way the ground falls.</summary>
internal sealed class WideScatter
{
    private readonly WorkingCloud cloud;
    private readonly List<(CellSums Sums, int[] CellOfFinest)> levels = [];
    private readonly StageContext context;

    /// <summary>Sums over the shared cells.</summary>
    public WideScatter(WorkingCloud cloud, StageContext context)
    {
        this.cloud = cloud;
        this.context = context;
        var finest = CellSums.Of(cloud.Grid, cloud.X, cloud.Y, cloud.Z, context.Threads, context.Stop);
        levels.Add((finest, [.. Enumerable.Range(0, finest.Count)]));
    }

    /// <summary>Rms about the plane and planarity within a radius, per shared cell. NaN and 0 with fewer than six points.</summary>
    /// <param name="radiusM">Radius [m].</param>
    /// <param name="fall">[out] Direction in which the ground falls (east, north): minus the covariance of height with place [m²].</param>
    public (float[] RmsM, float[] Planarity) Within(double radiusM, out (float East, float North)[] fall)
    {
        (CellSums sums, int[] cellOfFinest) = Level(radiusM / 2.6);
        float[] rms = new float[sums.Count], planarity = new float[sums.Count];
        var falls = new (float, float)[sums.Count];
        sums.Around(
            radiusM,
            context.Threads,
            context.Stop,
            (cell, n, _, covariance) =>
            {
                (double l1, double l2, double l3) = SmallestAxis.Of(covariance, out _);
                bool enough = n >= 6 && l2 > 1e-9 * l1 && l1 > 0;
                double s1 = Math.Sqrt(Math.Max(0, l1)), s2 = Math.Sqrt(Math.Max(0, l2)), s3 = Math.Sqrt(l3);

                // Three degrees of freedom went into the plane.
                rms[cell] = enough ? (float)(s3 * Math.Sqrt(n / (n - 3))) : float.NaN;
                planarity[cell] = enough ? (float)((s2 - s3) / s1) : 0;
                falls[cell] = ((float)-covariance.Xz, (float)-covariance.Yz);
            });
        fall = Array.ConvertAll(cellOfFinest, c => falls[c]);
        return (Array.ConvertAll(cellOfFinest, c => rms[c]), Array.ConvertAll(cellOfFinest, c => planarity[c]));
    }

    /// <summary>Spreads values of the shared cells to their points.</summary>
    public void ToPoints(float[] ofCell, float[] points, int stride, int at)
    {
        SortedGrid grid = cloud.Grid;
        BlockParallel.For(ofCell.Length, context.Threads, context.Stop, (from, to) =>
        {
            for (int c = from; c < to; c++)
            {
                for (int i = grid.Starts[c]; i < grid.Starts[c + 1]; i++) points[(i * stride) + at] = ofCell[c];
            }
        });
    }

    // The widest cells that are not wider than wanted.
    private (CellSums Sums, int[] CellOfFinest) Level(double edgeM)
    {
        int level = 0;
        while (levels[level].Sums.CellM * 2 <= edgeM)
        {
            if (level + 1 == levels.Count)
            {
                (CellSums finer, int[] cellOfFinest) = levels[level];
                CellSums wider = finer.Coarser(out int[] parent);
                levels.Add((wider, Array.ConvertAll(cellOfFinest, c => parent[c])));
            }

            level++;
        }

        return levels[level];
    }
}
