using System.Globalization;
using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Mixtures;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Maths.Mixtures;

public sealed class GaussianMixtureTests
{
    private static readonly double[] Faithful =
        [.. File.ReadAllLines(Repo.Path("testdata/reference/faithful.csv")).Skip(1)
            .SelectMany(l => l.Split(',')).Select(t => double.Parse(t, CultureInfo.InvariantCulture))];

    // R mclust on R's data set faithful, model VVV with 2 components: testdata/reference/r_gmm_faithful_VVV2.csv.
    [Fact]
    public void Two_own_covariances_on_faithful_agree_with_mclust()
    {
        string[][] rows = [.. File.ReadAllLines(Repo.Path("testdata/reference/r_gmm_faithful_VVV2.csv")).Skip(1).Select(l => l.Split(','))];
        GaussianMixture m = GaussianMixture.Fit(Faithful, 2, 2, CovarianceModel.Own, seed: 1)!;
        for (int c = 0; c < 2; c++)
        {
            double[] row = [.. rows[c].Select(t => double.Parse(t, CultureInfo.InvariantCulture))];
            Assert.Equal(row[1], m.Weights[c], 1e-4);
            Assert.Equal(row[2], m.Means[2 * c], 1e-3);
            Assert.Equal(row[3], m.Means[(2 * c) + 1], 1e-2);
            Assert.Equal(row[4], m.LogLikelihood, 1e-3);
            Assert.Equal(row[5], m.Bic(272, 272), 2e-3);
        }
    }

    // R mclust's table of BIC, testdata/reference/r_gmm_bic_faithful.csv: columns EEE (common) and VVV (own) up to 3
    // components, and the best of the table: 3 components with a common covariance. mclust starts from a hierarchical
    // clustering and may stay below the best likelihood; ours may lie above its value, never below.
    [Fact]
    public void Bic_chooses_three_components_with_a_common_covariance()
    {
        string[] lines = File.ReadAllLines(Repo.Path("testdata/reference/r_gmm_bic_faithful.csv"));
        int common = Array.IndexOf(lines[0].Split(','), "\"EEE\""), own = Array.IndexOf(lines[0].Split(','), "\"VVV\"");
        for (int k = 1; k <= 3; k++)
        {
            double[] row = [.. lines[k].Replace("\"", "", StringComparison.Ordinal).Split(',').Select(t => double.Parse(t, CultureInfo.InvariantCulture))];
            double ownBic = GaussianMixture.Fit(Faithful, 2, k, CovarianceModel.Own, seed: 1)!.Bic(272, 272);
            // mclust stops at a relative gain of 1e-5 in likelihood, ours at 1e-9: ours ends up to 0.05 above, not below.
            Assert.InRange(GaussianMixture.Fit(Faithful, 2, k, CovarianceModel.Common, seed: 1)!.Bic(272, 272) - row[common], -0.001, 0.05);
            Assert.InRange(ownBic - row[own], -0.001, k < 3 ? 0.05 : double.MaxValue);
        }

        Assert.Equal(3, GaussianMixture.Choose(Faithful, 2, 6, CovarianceModel.Common, 272, seed: 1)!.Components);
    }

    [Fact]
    public void Fewer_effective_items_choose_fewer_components()
    {
        Assert.Equal(2, GaussianMixture.Choose(Faithful, 2, 6, CovarianceModel.Common, 40, seed: 1)!.Components);
        Assert.Null(GaussianMixture.Fit(Faithful.AsSpan(0, 4), 2, 2, CovarianceModel.Own, seed: 1));
    }

    // testdata/reference/agreement_measures.csv, made with scikit-learn; R psych gives kappa 0.4 for the first.
    [Theory]
    [InlineData(new long[] { 20, 5, 10, 15 }, 2, 0.4, 0.7, 0.571429, 0.5)]
    [InlineData(new long[] { 50, 4, 1, 6, 30, 4, 2, 3, 20 }, 3, 0.736408566722, 0.833333333333, 0.793651, 0.638298)]
    [InlineData(new long[] { 9500, 100, 150, 250 }, 2, 0.653739612188, 0.975, 0.974359, 0.5)]
    public void Kappa_accuracy_and_iou_agree_with_libraries(long[] counts, int n, double kappa, double accuracy, double iou0, double iou1)
    {
        Assert.Equal(kappa, Agreement.Kappa(counts, n), 1e-9);
        Assert.Equal(accuracy, Agreement.Accuracy(counts, n), 1e-9);
        Assert.Equal(iou0, Agreement.Iou(counts, n, 0), 5e-7);
        Assert.Equal(iou1, Agreement.Iou(counts, n, 1), 5e-7);
    }

    // Two normal classes with means 0 and 2 and unit variance: the log odds at x are 2 x - 2 (by hand), pooled or not.
    [Theory]
    [InlineData(0.0)]
    [InlineData(1.0)]
    public void Discriminant_gives_the_log_odds_of_two_normals(double toPooled)
    {
        const int N = 40000;
        var items = new double[N];
        var classes = new int[N];
        for (int i = 0; i < N; i++)
        {
            var draws = new Draws(3, 2, (ulong)i);
            classes[i] = i % 2;
            items[i] = draws.NextNormal() + (2 * (i % 2));
        }

        Discriminant d = Discriminant.Learn(items, 1, classes, [], 2, toPooled, 0)!;
        Span<double> logs = stackalloc double[2];
        foreach (double x in new[] { -1.0, 0.5, 1.0, 3.0 })
        {
            d.Logs([x], logs);
            Assert.Equal((2 * x) - 2, logs[1] - logs[0], 0.2);   // 4 standard errors at x = -1: variances 0.01 each, times 9/2; means 0.007
        }
    }
}
