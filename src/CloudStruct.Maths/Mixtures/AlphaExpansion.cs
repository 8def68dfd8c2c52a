namespace CloudStruct.Maths.Mixtures;

/// <summary>Labels with the least cost per node plus a price per unlike pair of neighbours (Potts), by expansion moves.</summary>
/// <remarks>Boykov, Veksler and Zabih 2001, Fast approximate energy minimization via graph cuts, IEEE PAMI 23, 1222-1239:
/// exact for two labels, within a factor of two for more. The construction of each move follows Kolmogorov and Zabih 2004,
/// What energy functions can be minimized via graph cuts?, IEEE PAMI 26, 147-159.</remarks>
public static class AlphaExpansion
{
    /// <summary>Lowers the energy of a labelling until no expansion lowers it further.</summary>
    /// <param name="cost">Row-major, one row a node, one column a label; any sign.</param>
    /// <param name="labels">Number of labels.</param>
    /// <param name="ends">Two node numbers per edge.</param>
    /// <param name="weights">Price per edge when its ends differ, at least 0.</param>
    /// <param name="label">[in, out] Start and result; one per node.</param>
    /// <param name="cycles">Most rounds over all labels.</param>
    /// <returns>The energy reached.</returns>
    public static double Run(ReadOnlySpan<float> cost, int labels, ReadOnlySpan<int> ends, ReadOnlySpan<float> weights, Span<byte> label, int cycles = 8)
    {
        double energy = Energy(cost, labels, ends, weights, label);
        int sinceGain = 0;
        for (int step = 0; step < cycles * labels && sinceGain < labels; step++)
        {
            byte alpha = (byte)(step % labels);
            byte[] moved = Expand(cost, labels, ends, weights, label, alpha);
            double after = Energy(cost, labels, ends, weights, moved);
            if (after < energy - (1e-7 * Math.Abs(energy)))
            {
                moved.CopyTo(label);
                energy = after;
                sinceGain = 0;
            }
            else
            {
                sinceGain++;
            }
        }

        return energy;
    }

    /// <summary>Sum of costs of nodes and of unlike pairs.</summary>
    public static double Energy(ReadOnlySpan<float> cost, int labels, ReadOnlySpan<int> ends, ReadOnlySpan<float> weights, ReadOnlySpan<byte> label)
    {
        double sum = 0;
        for (int i = 0; i < label.Length; i++) sum += cost[(i * labels) + label[i]];
        for (int e = 0; e < weights.Length; e++)
        {
            if (label[ends[2 * e]] != label[ends[(2 * e) + 1]]) sum += weights[e];
        }

        return sum;
    }

    private static byte[] Expand(
        ReadOnlySpan<float> cost, int labels, ReadOnlySpan<int> ends, ReadOnlySpan<float> weights, ReadOnlySpan<byte> label, byte alpha)
    {
        // Source side keeps its label, sink side takes alpha.
        int n = label.Length;
        var graph = new MaxFlow(n, weights.Length);
        var keep = new double[n];
        var take = new double[n];
        for (int i = 0; i < n; i++)
        {
            keep[i] = cost[(i * labels) + label[i]];
            take[i] = cost[(i * labels) + alpha];
        }

        for (int e = 0; e < weights.Length; e++)
        {
            int p = ends[2 * e], q = ends[(2 * e) + 1];
            double w = weights[e];
            double both = label[p] == label[q] ? 0 : w;
            double pKeeps = label[p] == alpha ? 0 : w, qKeeps = label[q] == alpha ? 0 : w;
            // Costs of (keep, keep), (keep, take), (take, keep), (take, take) are both, pKeeps, qKeeps, 0: two terms on
            // the nodes and one non-negative arc have the same sums.
            keep[p] += both;
            take[p] += qKeeps;
            take[q] -= qKeeps;
            double arc = pKeeps + qKeeps - both;
            if (arc > 0) graph.AddEdge(p, q, arc, 0);
        }

        for (int i = 0; i < n; i++)
        {
            double least = Math.Min(keep[i], take[i]);
            graph.AddTerminal(i, take[i] - least, keep[i] - least);
        }

        graph.Solve();
        var moved = new byte[n];
        for (int i = 0; i < n; i++) moved[i] = graph.WithSource(i) ? label[i] : alpha;
        return moved;
    }
}
