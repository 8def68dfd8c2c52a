using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Fitting;

namespace CloudStruct.Tests.Maths.Fitting;

public class PlaneSplitTests
{
    [Theory]
    [InlineData(0)]
    [InlineData(60)]
    [InlineData(135)]
    public void A_fold_comes_back_with_its_line_and_its_turn(double deg)
    {
        (double[] u, double[] v) = Grid();
        double cos = Math.Cos(deg * Math.PI / 180), sin = Math.Sin(deg * Math.PI / 180);
        double[] r = [.. u.Zip(v, (x, y) => (0.02 * x) - (0.01 * y) + (0.1 * Math.Max(0, (cos * x) + (sin * y) - 0.15)))];
        PlaneSplit split = PlaneSplit.Best(u, v, r, 6)!.Value;
        Assert.Equal(deg * Math.PI / 180, split.Angle, 1e-9);
        Assert.Equal(0.15, split.At, 0.08);   // cells stand 0.1 m apart
        Assert.Equal(0.1, split.Turn, 0.003);
        Assert.True(split.TwoSquares < 0.01 * split.OneSquares);
        Assert.Equal(0.02, split.Low.B, 0.002);
        Assert.Equal(-0.01, split.Low.C, 0.002);
    }

    // Slow twin: the plane by the general solver, and every cut that the fast search may choose, one by one.
    [Fact]
    public void Sums_agree_with_general_least_squares_and_no_cut_is_better()
    {
        (double[] u, double[] v) = Grid();
        var draws = new Draws(3, 1, 0);
        double[] r = [.. u.Select(_ => draws.NextNormal())];
        PlaneSplit split = PlaneSplit.Best(u, v, r, 6)!.Value;
        int[] all = [.. Enumerable.Range(0, u.Length)];
        Assert.Equal(Squares(all), split.OneSquares, 1e-9);
        double least = double.PositiveInfinity;
        for (int k = 0; k < 12; k++)
        {
            double cos = Math.Cos(Math.PI * k / 12), sin = Math.Sin(Math.PI * k / 12);
            double[] key = [.. all.Select(i => (cos * u[i]) + (sin * v[i]))];
            int[] order = [.. all.OrderBy(i => key[i])];
            for (int cut = 6; cut <= order.Length - 6; cut++)
            {
                if (key[order[cut]] - key[order[cut - 1]] > 1e-9) least = Math.Min(least, Squares(order[..cut]) + Squares(order[cut..]));
            }
        }

        Assert.Equal(least, split.TwoSquares, 1e-9);

        double Squares(int[] cells)
        {
            double[] rows = [.. cells.SelectMany(i => new[] { 1, u[i], v[i] })];
            return LeastSquares.Solve(rows, [.. cells.Select(i => r[i])], 3) is { } s
                ? s.SumOfSquares
                : cells.Sum(i => Math.Pow(r[i] - cells.Average(j => r[j]), 2));
        }
    }

    [Fact]
    public void Too_few_cells_have_no_split()
    {
        Assert.Null(PlaneSplit.Best([0, 1, 0], [0, 0, 1], [0, 0, 0], 4));
    }

    private static (double[] U, double[] V) Grid()
    {
        var u = new double[120];
        var v = new double[120];
        for (int i = 0; i < 120; i++) (u[i], v[i]) = ((i % 12 * 0.1) - 0.55, (i / 12 * 0.1) - 0.45);
        return (u, v);
    }
}
