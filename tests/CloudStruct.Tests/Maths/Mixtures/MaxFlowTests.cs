using System.Globalization;
using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Mixtures;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Maths.Mixtures;

public sealed class MaxFlowTests
{
    // testdata/reference/potts_binary_4x4.csv: optimum over all 65536 labellings, and the same value by scipy's maximum_flow.
    [Fact]
    public void Binary_potts_4x4_has_energy_130_and_its_unique_labelling()
    {
        var flow = new MaxFlow(16, 24);
        int[] expected = new int[16];
        foreach (string line in File.ReadAllLines(Repo.Path("testdata/reference/potts_binary_4x4.csv")).Skip(1))
        {
            int[] f = [.. line.Split(',').Select(t => int.Parse(t, CultureInfo.InvariantCulture))];
            flow.AddTerminal(f[0], fromSource: f[4], toSink: f[3]);   // label 0 on the source's side pays cost 0
            expected[f[0]] = f[5];
        }

        foreach ((int a, int b) in Neighbours(4)) flow.AddEdge(a, b, 4, 4);
        Assert.Equal(130, flow.Solve());
        for (int i = 0; i < 16; i++) Assert.Equal(expected[i] == 0, flow.WithSource(i));
    }

    // testdata/reference/potts_3label_3x3.csv: optimum 49 over all 19683 labellings; the move's bound is twice that.
    [Fact]
    public void Three_label_potts_3x3_ends_at_49_from_every_constant_start()
    {
        var cost = new float[27];
        var expected = new byte[9];
        foreach (string line in File.ReadAllLines(Repo.Path("testdata/reference/potts_3label_3x3.csv")).Skip(1))
        {
            int[] f = [.. line.Split(',').Select(t => int.Parse(t, CultureInfo.InvariantCulture))];
            for (int l = 0; l < 3; l++) cost[(f[0] * 3) + l] = f[3 + l];
            expected[f[0]] = (byte)f[6];
        }

        int[] ends = [.. Neighbours(3).SelectMany(e => new[] { e.A, e.B })];
        float[] weights = [.. Enumerable.Repeat(3f, ends.Length / 2)];
        for (byte start = 0; start < 3; start++)
        {
            byte[] label = [.. Enumerable.Repeat(start, 9)];
            Assert.Equal(49, AlphaExpansion.Run(cost, 3, ends, weights, label));
            Assert.Equal(expected, label);
        }
    }

    // Strip law: on a periodic strip a band w nodes wide with advantage a per node survives a boundary weight L per unit
    // length exactly when w a > 2 L (closed form: the cost of its two sides against its gain).
    [Theory]
    [InlineData(3, 1.0, 1.49, true)]
    [InlineData(3, 1.0, 1.51, false)]
    [InlineData(5, 0.4, 0.99, true)]
    [InlineData(5, 0.4, 1.01, false)]
    public void A_band_survives_exactly_when_its_gain_exceeds_two_sides(int band, double advantage, double weight, bool survives)
    {
        const int Length = 12, Width = 15;
        var flow = new MaxFlow(Length * Width, 2 * Length * Width);
        for (int y = 0; y < Width; y++)
        {
            for (int x = 0; x < Length; x++)
            {
                bool inside = y >= 4 && y < 4 + band;
                flow.AddTerminal((y * Length) + x, inside ? advantage : 0, inside ? 0 : 10);
                flow.AddEdge((y * Length) + x, (y * Length) + ((x + 1) % Length), weight, weight);
                if (y + 1 < Width) flow.AddEdge((y * Length) + x, ((y + 1) * Length) + x, weight, weight);
            }
        }

        flow.Solve();
        Assert.Equal(survives, flow.WithSource((5 * Length) + 3));
    }

    // The slow truth: the best of all labellings of small random graphs.
    [Fact]
    public void Random_graphs_agree_with_trying_every_labelling()
    {
        for (ulong item = 0; item < 200; item++)
        {
            var draws = new Draws(7, 1, item);
            int n = 2 + draws.NextBelow(9), edges = draws.NextBelow(20);
            var source = new int[n];
            var sink = new int[n];
            var list = new List<(int A, int B, int Ab, int Ba)>();
            for (int i = 0; i < n; i++) (source[i], sink[i]) = (draws.NextBelow(10), draws.NextBelow(10));
            for (int e = 0; e < edges; e++)
            {
                int a = draws.NextBelow(n), b = draws.NextBelow(n);
                if (a != b) list.Add((a, b, draws.NextBelow(10), draws.NextBelow(10)));
            }

            var flow = new MaxFlow(n, 1);
            for (int i = 0; i < n; i++) flow.AddTerminal(i, source[i], sink[i]);
            foreach ((int a, int b, int ab, int ba) in list) flow.AddEdge(a, b, ab, ba);

            int Cost(Func<int, bool> withSource) =>
                Enumerable.Range(0, n).Sum(i => withSource(i) ? sink[i] : source[i])
                + list.Sum(e => withSource(e.A) && !withSource(e.B) ? e.Ab : withSource(e.B) && !withSource(e.A) ? e.Ba : 0);
            int best = Enumerable.Range(0, 1 << n).Min(bits => Cost(i => (bits >> i & 1) == 1));
            Assert.Equal(best, flow.Solve());
            Assert.Equal(best, Cost(flow.WithSource));
        }
    }

    private static IEnumerable<(int A, int B)> Neighbours(int n)
    {
        for (int i = 0; i < n * n; i++)
        {
            if (i % n < n - 1) yield return (i, i + 1);
            if (i / n < n - 1) yield return (i, i + n);
        }
    }
}
