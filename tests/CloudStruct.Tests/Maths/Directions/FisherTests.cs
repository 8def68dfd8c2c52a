using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Directions;
using CloudStruct.Records.Frame;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Maths.Directions;

public class FisherTests
{
    // P. Wessel, Data Analysis 1, ch. 9, printed: R 5.86 and 5.88, R/N 0.977 and 0.979, declination 122.1 and 59.9, pooled R 10.50.
    // His printed inclinations and k carry slips (arcsine of the mean before division, R rounded), so they are not checked.
    [Fact]
    public void Printed_values_of_two_sites()
    {
        FisherMean one = FisherMean.Of(Site(1)), two = FisherMean.Of(Site(2));
        Assert.Equal(5.86, one.R, 0.005);
        Assert.Equal(5.88, two.R, 0.005);
        Assert.Equal(0.977, one.R / 6, 0.0005);
        Assert.Equal(0.979, two.R / 6, 0.0005);
        Assert.Equal(122.1, TrendPlunge.OfDirection(one.Mean).TrendDeg, 0.05);
        Assert.Equal(59.9, TrendPlunge.OfDirection(two.Mean).TrendDeg, 0.05);
        Assert.Equal(10.50, FisherMean.Of([.. Site(1), .. Site(2)]).R, 0.005);
    }

    // The same input; digits by numpy and scipy.
    [Theory]
    [InlineData(1, "site1")]
    [InlineData(2, "site2")]
    [InlineData(0, "pooled")]
    public void Mean_concentration_and_exact_cone_agree_with_scipy(int site, string column)
    {
        FisherMean m = FisherMean.Of(site == 0 ? [.. Site(1), .. Site(2)] : Site(site));
        ReferenceTable r = ReferenceTable.Read("reference/fisher_example_results.csv");
        Assert.Equal(r.Of("R", column), m.R, 1e-9);
        Assert.Equal(r.Of("k", column), m.K, 1e-6);
        Assert.Equal(r.Of("kappa_ml", column), m.KappaMl, 1e-6);
        Assert.Equal(r.Of("a95_exact", column), m.Cone95Deg, 1e-6);
        TrendPlunge mean = TrendPlunge.OfDirection(m.Mean);
        Assert.Equal(r.Of("dec", column), mean.TrendDeg, 1e-6);
        Assert.Equal(r.Of("inc", column), mean.PlungeDeg, 1e-6);
    }

    // Forms from memory (Watson and Williams 1956, Watson 1983); values by scipy.stats.f. Wessel prints F 47.4.
    [Fact]
    public void Two_sites_do_not_share_a_mean()
    {
        FisherTwoSample test = FisherTwoSample.Of(Site(1), Site(2));
        ReferenceTable r = ReferenceTable.Read("reference/fisher_two_sample.csv");
        Assert.Equal(47.4, test.F, 0.05);
        Assert.Equal(r.Of("F", "value"), test.F, 1e-5);
        Assert.Equal(r.Of("p", "value"), test.P, 1e-11);
        Assert.Equal(r.Of("Watson_Vw", "value"), test.V, 1e-5);
        Assert.Equal(r.Of("angle_between_means_deg", "value"), test.AngleDeg, 1e-6);
    }

    [Fact]
    public void Exact_cones_agree_with_the_table()
    {
        ReferenceTable r = ReferenceTable.Read("reference/fisher_alpha95_table.csv");
        Assert.Equal(25, r.Count);
        for (int i = 0; i < r.Count; i++)
        {
            Assert.Equal(r.Number(i, "alpha95_exact_deg"), Fisher.ConeDeg(r.Number(i, "n"), r.Number(i, "R")), 1e-6);
        }
    }

    [Fact]
    public void Nothing_is_known_about_the_mean_of_one_direction()
    {
        Assert.Equal(180, Fisher.ConeDeg(1, 1));
        Assert.Equal(180, Fisher.ConeDeg(0, 0));
        Assert.Equal(0, Fisher.ConeDeg(5, 5), 1e-12);
    }

    // 40-digit arithmetic; the cumulative law at cos θ gives u back (asserted there).
    [Fact]
    public void Inverse_cumulative_law_keeps_its_digits()
    {
        ReferenceTable r = ReferenceTable.Read("reference/vmf_inverse_cdf.csv");
        Assert.Equal(25, r.Count);
        for (int i = 0; i < r.Count; i++)
        {
            // The table holds cos θ to 12 digits, so 1 - cos θ is known to 1e-12 and no better.
            double expected = 1 - r.Number(i, "cos_theta"), found = Fisher.OneMinusCosine(r.Number(i, "kappa"), r.Number(i, "u"));
            Assert.Equal(expected, found, 1.1e-12 + (1e-12 * expected));

            // And back through the cumulative law, to full precision.
            double kappa = r.Number(i, "kappa"), w = 1 - found;
            double u = (Math.Exp(kappa * (w - 1)) - Math.Exp(-2 * kappa)) / (1 - Math.Exp(-2 * kappa));
            Assert.Equal(r.Number(i, "u"), u, kappa < 0.1 ? 1e-11 : 1e-12);
        }
    }

    [Fact]
    public void Mean_length_and_normaliser_hold_from_tiny_to_huge_concentrations()
    {
        ReferenceTable r = ReferenceTable.Read("reference/vmf_langevin.csv");
        for (int i = 0; i < r.Count; i++)
        {
            double kappa = r.Number(i, "kappa"), a = r.Number(i, "A_kappa");
            Assert.Equal(a, Fisher.MeanLength(kappa), 1e-10);
            Assert.Equal(r.Number(i, "log_normaliser"), Fisher.LogNormaliser(kappa), 1e-10 * Math.Max(1, Math.Abs(r.Number(i, "log_normaliser"))));
            Assert.Equal(1, Fisher.KappaOf(Fisher.MeanLength(kappa)) / kappa, 1e-8);
        }
    }

    // The law: mean resultant 0.95 at kappa 20; the distance of the sample from its cumulative law by Kolmogorov and Smirnov.
    [Fact]
    public void A_sample_of_100000_follows_the_law()
    {
        const int n = 100_000;
        const double kappa = 20;
        Vec3 mean = new TrendPlunge(123, 31).ToVector();
        var sum = default(Vec3);
        double[] u = new double[n];
        for (int i = 0; i < n; i++)
        {
            var draws = new Draws(5, 77, (ulong)i);
            Vec3 v = Fisher.Draw(mean, kappa, ref draws);
            sum += v;
            u[i] = (Math.Exp(kappa * (v.Dot(mean) - 1)) - Math.Exp(-2 * kappa)) / (1 - Math.Exp(-2 * kappa));
        }

        Assert.Equal(0.95, sum.Length / n, 0.0007);   // four standard errors
        Assert.True(mean.Dot(sum.Unit()) > Math.Cos(0.2 * Math.PI / 180));
        Array.Sort(u);
        double farthest = 0;
        for (int i = 0; i < n; i++) farthest = Math.Max(farthest, Math.Max(Math.Abs(u[i] - ((double)i / n)), Math.Abs(u[i] - ((i + 1.0) / n))));
        Assert.True(farthest * Math.Sqrt(n) < 1.95);   // p = 0.001
    }

    private static Vec3[] Site(int site)
    {
        ReferenceTable t = ReferenceTable.Read("reference/fisher_example_input.csv");
        return [.. Enumerable.Range(0, t.Count).Where(i => t.Number(i, "site") == site)
            .Select(i => new TrendPlunge(t.Number(i, "dec"), t.Number(i, "inc")).ToVector())];
    }
}
