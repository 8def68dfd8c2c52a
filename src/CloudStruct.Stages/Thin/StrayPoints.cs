using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;

namespace CloudStruct.Stages.Thin;

/// <summary>Finds points that belong to no surface.</summary>
internal static class StrayPoints
{
    private const int FewNeighbours = 3;

    // Distance to the sixth neighbour against the same of its neighbours: 1 on any surface, however sparse, and about 3
    // for a point that floats three spacings above one.
    private const int Rank = 6;
    private const float FarRatio = 2.5f;
    private const float FarSpacings = 2.5f;

    /// <summary>Marks stray points.</summary>
    /// <param name="grid">Grid of the points.</param>
    /// <param name="reach">Distance to the sixth neighbour of each point [m]; infinite when fewer lie near.</param>
    /// <param name="neighbours">K a point.</param>
    /// <param name="spacingM">Spacing aimed at [m].</param>
    /// <param name="clusterPoints">Clusters of fewer points are stray.</param>
    /// <param name="context">Threads and stop.</param>
    public static bool[] Mark(
        SortedGrid grid, float[] reach, int[] neighbours, double spacingM, int clusterPoints, StageContext context)
    {
        var stray = new bool[reach.Length];
        float far = (float)(FarSpacings * spacingM);
        BlockParallel.For(
            reach.Length,
            context.Threads,
            context.Stop,
            (from, to) =>
            {
                for (int i = from; i < to; i++)
                {
                    ReadOnlySpan<int> row = neighbours.AsSpan(i * WorkingCloud.K, WorkingCloud.K);
                    if (row[FewNeighbours - 1] < 0) stray[i] = true;
                    else if (reach[i] > far) stray[i] = reach[i] > FarRatio * MeanReach(row, reach);
                }
            });
        MarkClusters(grid, stray, clusterPoints);
        return stray;
    }

    /// <summary>Distance to the sixth neighbour.</summary>
    public static float[] Reach(float[] x, float[] y, float[] z, int[] neighbours, StageContext context)
    {
        var reach = new float[x.Length];
        BlockParallel.For(
            x.Length,
            context.Threads,
            context.Stop,
            (from, to) =>
            {
                for (int i = from; i < to; i++)
                {
                    int j = neighbours[((long)i * WorkingCloud.K) + Rank - 1];
                    reach[i] = j < 0
                        ? float.PositiveInfinity
                        : MathF.Sqrt(((x[i] - x[j]) * (x[i] - x[j])) + ((y[i] - y[j]) * (y[i] - y[j])) + ((z[i] - z[j]) * (z[i] - z[j])));
                }
            });
        return reach;
    }

    // Neighbours that are far out themselves say nothing about the surface.
    private static float MeanReach(ReadOnlySpan<int> row, float[] reach)
    {
        float sum = 0;
        int n = 0;
        foreach (int j in row)
        {
            if (j < 0 || float.IsInfinity(reach[j])) continue;
            sum += reach[j];
            n++;
        }

        return n == 0 ? float.PositiveInfinity : sum / n;
    }

    // Clusters of touching cells. An empty cell between two clusters is a gap of one to two cells (3 to 6 spacings).
    private static void MarkClusters(SortedGrid grid, bool[] stray, int clusterPoints)
    {
        int cells = grid.Keys.Length;
        var root = new int[cells];
        var points = new int[cells];
        for (int c = 0; c < cells; c++)
        {
            root[c] = c;
            for (int i = grid.Starts[c]; i < grid.Starts[c + 1]; i++)
            {
                if (!stray[i]) points[c]++;
            }
        }

        // Each cell looks at the half of its neighbours with a lower key; five runs of keys cover them.
        long layer = (long)grid.NX * grid.NY;
        long[] before = [-layer - grid.NX, -layer, -layer + grid.NX, -grid.NX];
        var cursor = new int[before.Length];
        for (int c = 0; c < cells; c++)
        {
            if (points[c] == 0) continue;
            long key = grid.Keys[c];
            if (c > 0 && grid.Keys[c - 1] == key - 1 && points[c - 1] > 0) Join(root, c, c - 1);
            for (int r = 0; r < before.Length; r++)
            {
                long from = key + before[r] - 1;
                int k = cursor[r];
                while (grid.Keys[k] < from) k++;
                cursor[r] = k;
                for (; grid.Keys[k] <= from + 2; k++)
                {
                    if (points[k] > 0) Join(root, c, k);
                }
            }
        }

        var total = new int[cells];
        for (int c = 0; c < cells; c++) total[Find(root, c)] += points[c];
        int largest = total.Length == 0 ? 0 : total.Max();
        for (int c = 0; c < cells; c++)
        {
            int n = total[Find(root, c)];
            if (n >= clusterPoints || n == largest) continue;
            for (int i = grid.Starts[c]; i < grid.Starts[c + 1]; i++) stray[i] = true;
        }
    }

    private static int Find(int[] root, int c)
    {
        while (root[c] != c)
        {
            root[c] = root[root[c]];
            c = root[c];
        }

        return c;
    }

    private static void Join(int[] root, int a, int b)
    {
        int ra = Find(root, a), rb = Find(root, b);
        if (ra < rb) root[rb] = ra;
        else root[ra] = rb;
    }
}
