using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Directions;
using CloudStruct.Records.Frame;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Maths.Directions;

public class CommonMeanTestTests
{
    // Watson 1983: with w = k R the statistic is his V_w; the two sites of Wessel's example give 94.737294 (computed outside this
    // program), angle 53.113670.
    [Fact]
    public void Statistic_is_that_of_Watson_for_two_Fisher_samples()
    {
        ReferenceTable t = ReferenceTable.Read("reference/fisher_example_input.csv");
        Vec3[] Site(int site) => [.. Enumerable.Range(0, t.Count).Where(i => (int)t.Number(i, "site") == site)
            .Select(i => new TrendPlunge(t.Number(i, "dec"), t.Number(i, "inc")).ToVector())];
        FisherMean a = FisherMean.Of(Site(1)), b = FisherMean.Of(Site(2));
        var test = CommonMeanTest.Of(a.Mean, 1 / (a.K * a.R), a.N, b.Mean, 1 / (b.K * b.R), b.N);
        Assert.Equal(94.737294, test.V, 1e-5);
        Assert.Equal(53.113670, test.AngleDeg, 1e-5);
        Assert.True(test.P < 1e-6);
    }

    // A test at 5 % rejects a true common mean 5 times in 100: binomial, 2000 pairs, standard error 0.005.
    [Fact]
    public void One_mean_is_called_two_in_a_twentieth_of_all_pairs()
    {
        int apart = 0;
        for (ulong s = 1; s <= 2000; s++)
        {
            var d = new Draws(s, 51, 0);
            FisherMean a = Draw(12, 60, ref d), b = Draw(30, 150, ref d);
            if (CommonMeanTest.Of(a.Mean, 1 / (a.K * a.R), a.N, b.Mean, 1 / (b.K * b.R), b.N).P < 0.05) apart++;
        }

        Assert.InRange(apart / 2000.0, 0.035, 0.065);
    }

    [Fact]
    public void Signs_do_not_matter_and_the_critical_angle_is_where_P_is_a_twentieth()
    {
        Vec3 m = new Vec3(1, 2, 3).Unit(), other = new Vec3(1.1, 2, 3).Unit();
        var test = CommonMeanTest.Of(m, 0.001, 10, other, 0.002, 20);
        Assert.Equal(test, CommonMeanTest.Of(m, 0.001, 10, -other, 0.002, 20));
        (Vec3 e1, _) = Tangent.Axes(m);
        double c = test.CriticalDeg * Math.PI / 180;
        Assert.Equal(0.05, CommonMeanTest.Of(m, 0.001, 10, (m * Math.Cos(c)) + (e1 * Math.Sin(c)), 0.002, 20).P, 1e-6);
    }

    private static FisherMean Draw(int n, double kappa, ref Draws d)
    {
        Vec3[] v = new Vec3[n];
        for (int i = 0; i < n; i++) v[i] = Fisher.Draw(Vec3.Up, kappa, ref d);
        return FisherMean.Of(v);
    }
}
