using System.Runtime.Intrinsics;
using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Mixtures;
using CloudStruct.Stages.Classify;

namespace CloudStruct.Tests.Stages.Classify;

/// <summary>The fast ways of the stage against the plain ones.</summary>
public sealed class ClassifyKernelTests
{
    // Plain definition: share of pairs in which the first is larger, ties half (Hanley and McNeil 1982, Radiology 143, 29-36).
    [Theory]
    [InlineData(40)]
    [InlineData(1700)]
    public void Separation_by_ranks_is_the_share_of_pairs(int n)
    {
        var draws = new Draws(7, 1, 0);
        float[] inside = new float[n], outside = new float[n + 13];
        // Rounded, so that there are ties, and with both zeros and both signs.
        for (int i = 0; i < inside.Length; i++) inside[i] = (float)Math.Round(5 * draws.NextNormal()) + 1;
        for (int i = 0; i < outside.Length; i++) outside[i] = (float)Math.Round(5 * draws.NextNormal());
        double wins = 0;
        foreach (float a in inside)
        {
            foreach (float b in outside) wins += a > b ? 1 : a == b ? 0.5 : 0;
        }

        float[] sorted = [.. inside.Order()];
        RankSeparation.Sort(inside);
        RankSeparation.Sort(outside);
        Assert.Equal(sorted, inside);
        Assert.Equal(wins / inside.Length / outside.Length, RankSeparation.Auc(inside, outside), 12);
    }

    [Fact]
    public void What_is_not_a_number_is_sorted_first()
    {
        float[] values = [.. Enumerable.Range(0, 2000).Select(i => i % 5 == 0 ? float.NaN : i % 2 == 0 ? i : -i), float.PositiveInfinity, float.NegativeInfinity];
        float[] sorted = [.. values.Order()];
        RankSeparation.Sort(values);
        Assert.Equal(sorted, values);
    }

    [Fact]
    public void Rising_order_is_exact_and_keeps_equal_values_as_they_came()
    {
        var draws = new Draws(3, 2, 0);
        // Far apart ends leave many values in one step of the coarse order.
        double[] values = [.. Enumerable.Range(0, 5000).Select(i => i % 7 == 0 ? 0.25 : draws.NextNormal() * 1e-9), -4e6, 3e6];
        int[] wanted = [.. Enumerable.Range(0, values.Length).OrderBy(i => values[i])];
        Assert.Equal(wanted, StrikeOrder.Rising(values));
        Assert.Empty(StrikeOrder.Rising([]));
        Assert.Equal([0, 1, 2], StrikeOrder.Rising([5, 5, 5]));
    }

    [Fact]
    public void Four_items_at_once_have_the_densities_of_each_alone()
    {
        var draws = new Draws(11, 3, 0);
        double[] items = [.. Enumerable.Range(0, 900).Select(i => draws.NextNormal() + (i % 6 < 3 ? 3 : 0))];
        GaussianMixture mixture = GaussianMixture.Fit(items, 3, 2, CovarianceModel.Own, seed: 1)!;
        int[] classes = [.. Enumerable.Range(0, 300).Select(i => i % 2)];
        Discriminant two = Discriminant.Learn(items, 3, classes, [], 2, toPooled: 0.3, toDiagonal: 0.05)!;
        Span<Vector256<double>> item = stackalloc Vector256<double>[3], logs = stackalloc Vector256<double>[2], sides = stackalloc Vector256<double>[2];
        for (int j = 0; j < 3; j++) item[j] = Vector256.Create(items[j], items[3 + j], items[6 + j], 40);   // the last lies far off all
        Vector256<double> whole = mixture.LogDensities(item, logs);
        two.Logs(item, sides);
        Span<double> log = stackalloc double[2], side = stackalloc double[2];
        for (int e = 0; e < 4; e++)
        {
            ReadOnlySpan<double> one = e < 3 ? items.AsSpan(3 * e, 3) : [40, 40, 40];
            Assert.Equal(mixture.LogDensities(one, log), whole[e], 1e-9);
            two.Logs(one, side);
            for (int c = 0; c < 2; c++)
            {
                Assert.Equal(log[c], logs[c][e]);
                Assert.Equal(side[c], sides[c][e]);
            }
        }
    }

    [Fact]
    public void Separate_clouds_are_those_that_a_walk_over_two_cells_finds()
    {
        // As thin as to fall into many pieces, on both sides of zero.
        var draws = new Draws(5, 4, 0);
        int[] cell = [.. Enumerable.Range(0, 400).Select(_ => (draws.NextBelow(26) - 13, draws.NextBelow(26) - 13, draws.NextBelow(26) - 13)).Distinct().SelectMany(c => (int[])[c.Item1, c.Item2, c.Item3])];
        int[] piece = SeparateClouds.Of(cell), walked = new int[cell.Length / 3];
        Array.Fill(walked, -1);
        var stack = new Stack<int>();
        for (int start = 0; start < walked.Length; start++)
        {
            if (walked[start] >= 0) continue;
            walked[start] = start;
            stack.Push(start);
            while (stack.TryPop(out int i))
            {
                for (int j = 0; j < walked.Length; j++)
                {
                    bool near = Enumerable.Range(0, 3).All(a => Math.Abs(cell[(3 * i) + a] - cell[(3 * j) + a]) <= 2);
                    if (!near || walked[j] >= 0) continue;
                    walked[j] = start;
                    stack.Push(j);
                }
            }
        }

        Assert.Equal(walked, piece);
        Assert.InRange(piece.Distinct().Count(), 10, 390);
    }

    // A table that cannot grow would be searched for ever once full.
    [Fact]
    public void Cells_beyond_those_expected_keep_their_numbers()
    {
        var map = new CellMap(1);
        for (int i = 0; i < 1000; i++) Assert.Equal(i, map.FindOrAdd(i - 500, 7 * i, -i));
        for (int i = 0; i < 1000; i++) Assert.Equal(i, map.Find(i - 500, 7 * i, -i));
        Assert.Equal(-1, map.Find(1000, 0, 0));
        Assert.Equal(1000, map.Count);
    }
}
