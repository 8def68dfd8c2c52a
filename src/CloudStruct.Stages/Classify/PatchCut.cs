using CloudStruct.Maths.Mixtures;

namespace CloudStruct.Stages.Classify;

/// <summary>Smooths a two-way choice over neighbouring patches by an exact graph cut whose price is per metre of boundary.</summary>
internal static class PatchCut
{
    /// <summary>Chooses for the active patches; the others keep what they are and pull at their neighbours.</summary>
    /// <param name="patches">The patches.</param>
    /// <param name="odds">Log odds per patch for saying yes.</param>
    /// <param name="active">Patches to choose for.</param>
    /// <param name="yes">[in, out] The choice.</param>
    /// <param name="fixedIn">Inactive patches that take part as they are; null when none does.</param>
    /// <param name="perM">Price of a metre of boundary.</param>
    /// <remarks>A line that crosses a square lattice with eight neighbours cuts edges whose prices
    /// π/8 · spacing²/length add up to its length within some percent, whatever its direction (Boykov and Kolmogorov 2003,
    /// Computing geodesics and minimal surfaces via graph cuts). Evidence counts per independent piece of surface, so that
    /// neither side depends on the density of points.</remarks>
    public static void Run(Patches patches, float[] odds, bool[] active, bool[] yes, bool[]? fixedIn, double perM)
    {
        var node = new int[patches.Count];
        int n = 0;
        for (int i = 0; i < node.Length; i++) node[i] = active[i] ? n++ : -1;
        if (n == 0) return;
        var flow = new MaxFlow(n, 5 * n);
        double size = patches.SizeM;
        for (int i = 0; i < patches.Count; i++)
        {
            if (node[i] < 0) continue;
            double evidence = odds[i] * patches.AreaM2[i] / SheetFitter.IndependentM2;
            double source = Math.Max(0, evidence), sink = Math.Max(0, -evidence);
            foreach (int j in patches.Around(i))
            {
                if (j == i) continue;
                int dx = patches.Cell[3 * i] - patches.Cell[3 * j], dy = patches.Cell[(3 * i) + 1] - patches.Cell[(3 * j) + 1], dz = patches.Cell[(3 * i) + 2] - patches.Cell[(3 * j) + 2];
                double price = perM * size * Math.PI / 8 / Math.Sqrt((dx * dx) + (dy * dy) + (dz * dz));
                if (node[j] >= 0)
                {
                    if (j > i) flow.AddEdge(node[i], node[j], price, price);
                }
                else if (fixedIn != null && fixedIn[j])
                {
                    if (yes[j]) source += price;
                    else sink += price;
                }
            }

            flow.AddTerminal(node[i], source, sink);
        }

        flow.Solve();
        for (int i = 0; i < patches.Count; i++)
        {
            if (node[i] >= 0) yes[i] = flow.WithSource(node[i]);
        }
    }

    /// <summary>Patches within some rings of lattice cells of marked ones, themselves included.</summary>
    public static bool[] Grown(Patches patches, bool[] marked, int rings)
    {
        bool[] grown = (bool[])marked.Clone();
        var front = new List<int>();
        for (int i = 0; i < marked.Length; i++)
        {
            if (marked[i]) front.Add(i);
        }

        for (int r = 0; r < rings; r++)
        {
            var next = new List<int>();
            foreach (int i in front)
            {
                foreach (int j in patches.Around(i))
                {
                    if (grown[j]) continue;
                    grown[j] = true;
                    next.Add(j);
                }
            }

            front = next;
        }

        return grown;
    }
}
