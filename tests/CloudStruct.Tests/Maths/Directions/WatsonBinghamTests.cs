using CloudStruct.Maths.Directions;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Maths.Directions;

public class WatsonBinghamTests
{
    // mpmath, 40 digits, equal to scipy.special.hyp1f1.
    [Fact]
    public void Watson_normaliser_agrees_from_minus_500_to_500()
    {
        ReferenceTable r = ReferenceTable.Read("reference/watson_normaliser.csv");
        for (int i = 0; i < r.Count; i++)
        {
            double kappa = r.Number(i, "kappa"), log = r.Number(i, "log_M");
            Assert.Equal(log, Watson.LogNormaliser(kappa), 1e-10 * Math.Max(1, Math.Abs(log)));   // the table has 12 digits
            Assert.Equal(r.Number(i, "mean_cos2"), Watson.MeanCosineSquared(kappa), 1e-10);
        }
    }

    [Theory]
    [InlineData(39.999999)]
    [InlineData(-39.999999)]
    [InlineData(0.00999999)]
    public void Watson_is_smooth_where_its_series_change(double kappa)
    {
        double step = Math.Sign(kappa) * 2e-6, slope = Watson.MeanCosineSquared(kappa);
        Assert.Equal(slope * step, Watson.LogNormaliser(kappa + step) - Watson.LogNormaliser(kappa), 2e-12);
    }

    [Theory]
    [InlineData(-300)]
    [InlineData(-2)]
    [InlineData(0.001)]
    [InlineData(4)]
    [InlineData(480)]
    public void Watson_concentration_comes_back_from_its_mean(double kappa) =>
        Assert.Equal(kappa, Watson.KappaOf(Watson.MeanCosineSquared(kappa)), 1e-6 * Math.Max(1, Math.Abs(kappa)));

    // One-dimensional Bessel integral equal to a two-dimensional quadrature (mpmath, scipy).
    [Fact]
    public void Bingham_normaliser_agrees_with_quadrature()
    {
        ReferenceTable r = ReferenceTable.Read("reference/bingham_normaliser.csv");
        for (int i = 0; i < r.Count; i++)
        {
            double log = Bingham.LogNormaliser(r.Number(i, "kappa1"), r.Number(i, "kappa2"));
            Assert.Equal(r.Number(i, "log_c"), log, 1e-8);
        }
    }

    [Fact]
    public void Bingham_with_equal_concentrations_is_Watson()
    {
        // exp(k(x² + y²)) = exp(k) exp(-k z²).
        foreach (double k in new[] { -0.3, -7, -150 }) Assert.Equal(k + Watson.LogNormaliser(-k), Bingham.LogNormaliser(k, k), 1e-10);
    }

    [Theory]
    [InlineData(-40, -10)]
    [InlineData(-600, -3)]
    [InlineData(-2, -1)]
    [InlineData(-5000, -4000)]
    public void Bingham_concentrations_come_back_from_their_eigenvalues(double k1, double k2)
    {
        (_, double x2, double y2) = Bingham.Integrate(k1, k2);
        (double f1, double f2) = Bingham.KappasOf(x2, y2);
        Assert.Equal(k1, f1, 1e-5 * Math.Abs(k1));
        Assert.Equal(k2, f2, 1e-5 * Math.Abs(k2));
    }
}
