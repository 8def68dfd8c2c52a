using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Directions;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Sets;

/// <summary>How often a set comes back when the outcrop is drawn anew from its own blocks.</summary>
/// <remarks>Places are drawn with replacement, not faces: neighbours are alike, and a set that one corner alone shows must fail
/// where that corner is not drawn. The search starts from nothing each time.</remarks>
internal static class SetStability
{
    private const int Replicates = 20;
    private const int BlocksAcross = 5;

    // The search among so many planes tells sets as well as among all, in a tenth of the time.
    private const int MostPlanes = 300;

    private const double NearDeg = 10;

    /// <summary>Share of draws in which each set came back, in the order of the means.</summary>
    /// <param name="planes">Planes of the domain.</param>
    /// <param name="middles">Middle of each plane's largest face [m].</param>
    /// <param name="means">Mean axes of the sets.</param>
    /// <param name="conesDeg">Their cones [deg]: a mean known to 8 deg may come back 8 deg off.</param>
    /// <param name="rules">Limits.</param>
    /// <param name="seed">Seed of the run.</param>
    /// <param name="threads">Workers.</param>
    /// <param name="stop">Cancels.</param>
    public static double[] Of(
        DomainPlanes planes, Vec3[] middles, Vec3[] means, double[] conesDeg, ClusterRules rules, ulong seed, int threads, CancellationToken stop)
    {
        int[][] blocks = Blocks(middles);
        bool[][] back = new bool[Replicates][];
        double[] scaled = AxisClusters.Scaled(planes.Weights);
        BlockParallel.For(
            Replicates,
            threads,
            stop,
            (from, to) =>
            {
                for (int d = from; d < to; d++) back[d] = Once(planes, scaled, blocks, means, conesDeg, rules, seed, d, stop);
            },
            1);
        return [.. means.Select((_, s) => back.Count(b => b[s]) / (double)Replicates)];
    }

    private static bool[] Once(
        DomainPlanes planes, double[] scaled, int[][] blocks, Vec3[] means, double[] conesDeg, ClusterRules rules, ulong seed, int draw, CancellationToken stop)
    {
        var dice = new Draws(seed, 0x57ab, (ulong)draw);
        int[] times = new int[planes.Poles.Length];
        for (int b = 0; b < blocks.Length; b++) foreach (int p in blocks[dice.NextBelow(blocks.Length)]) times[p]++;
        int[] drawn = [.. Enumerable.Range(0, times.Length).Where(p => times[p] > 0)];
        AxisClusters again = AxisClusters.Find(
            [.. drawn.Select(p => planes.Poles[p])], [.. drawn.Select(p => scaled[p] * times[p])], rules, seed + (ulong)draw, MostPlanes, false, stop);
        var pairs = new List<(double Deg, int Set, int Cluster)>();
        for (int s = 0; s < means.Length; s++)
        {
            for (int c = 0; c < again.Count; c++)
            {
                double deg = Math.Acos(Math.Min(1, Math.Abs(means[s].Dot(again.Mixture.Components[c].Mean)))) * 180 / Math.PI;
                if (deg <= NearDeg + conesDeg[s]) pairs.Add((deg, s, c));
            }
        }

        bool[] back = new bool[means.Length], used = new bool[again.Count];
        foreach ((_, int s, int c) in pairs.OrderBy(p => p.Deg).ThenBy(p => p.Set))
        {
            if (back[s] || used[c]) continue;
            back[s] = used[c] = true;
        }

        return back;
    }

    /// <summary>Planes by cubes, five along the longest side of the outcrop; one plane a block when all lie at one place.</summary>
    private static int[][] Blocks(Vec3[] middles)
    {
        double x = middles.Min(m => m.X), y = middles.Min(m => m.Y), z = middles.Min(m => m.Z);
        double side = Math.Max(middles.Max(m => m.X) - x, Math.Max(middles.Max(m => m.Y) - y, middles.Max(m => m.Z) - z)) / BlocksAcross;
        if (!(side > 0)) return [.. middles.Select((_, i) => new[] { i })];
        return [.. Enumerable.Range(0, middles.Length)
            .GroupBy(i => ((int)((middles[i].X - x) / side), (int)((middles[i].Y - y) / side), (int)((middles[i].Z - z) / side)))
            .OrderBy(g => g.Key).Select(g => g.ToArray())];
    }
}
