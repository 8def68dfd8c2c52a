using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Chance;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Simulate;

public class FisherLawTests
{
    // Reference: inverse of the cumulative law in 40-digit arithmetic (testdata/reference/directions.md). The file gives
    // cos theta to 12 significant digits.
    [Fact]
    public void Inverse_of_the_cumulative_law_agrees_with_40_digit_arithmetic()
    {
        ReferenceTable table = ReferenceTable.Read("reference/vmf_inverse_cdf.csv");
        for (int i = 0; i < table.Count; i++)
        {
            double cosine = FisherLaw.CosTheta(table.Number(i, "kappa"), table.Number(i, "u"));
            Assert.Equal(table.Number(i, "cos_theta"), cosine, 2e-12);
            Assert.Equal(table.Number(i, "theta_deg"), Math.Acos(Math.Clamp(cosine, -1, 1)) * 180 / Math.PI, 1e-5);
        }
    }

    // Fisher 1953: the mean of cos theta is coth kappa - 1/kappa; values from testdata/reference/vmf_langevin.csv. The
    // sum of n cosines scatters by 1/kappa per direction at most, so five standard errors are 5/(kappa sqrt n).
    [Theory]
    [InlineData("10")]
    [InlineData("100")]
    public void Drawn_directions_have_the_mean_length_of_their_concentration(string kappa)
    {
        double expected = ReferenceTable.Read("reference/vmf_langevin.csv").Of(kappa, "A_kappa"), k = double.Parse(kappa);
        const int n = 20_000;
        var dice = new Dice(99, Purpose.Plan);
        Vec3 mean = new Vec3(0.3, -0.5, 0.8).Unit(), sum = default;
        for (int i = 0; i < n; i++) sum += dice.Fisher(mean, k);
        Assert.Equal(expected, sum.Dot(mean) / n, 5 / (k * Math.Sqrt(n)));
        // No preferred side: the sum points along the mean, to five standard errors of one component.
        Assert.True(sum.Unit().Cross(mean).Length < 5 / Math.Sqrt(k * n));
    }

    [Fact]
    public void Ends_of_the_law_are_the_poles()
    {
        Assert.Equal(1, FisherLaw.CosTheta(50, 1), 15);
        Assert.Equal(-1, FisherLaw.CosTheta(50, 0), 12);
        Assert.InRange(FisherLaw.OneMinusCos(10_000, 0.5), 0, 1e-4);
    }
}
