using CloudStruct.Maths.Rates;
using CloudStruct.Records.Width;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Maths.Rates;

public class CensoredRateTests
{
    // Eight whole and two cut-off spacings; maximum likelihood and chi-square limits by scipy.
    [Fact]
    public void Censored_spacing_agrees_with_scipy()
    {
        ReferenceTable r = ReferenceTable.Read("reference/spacing_censored.csv");
        double length = r.Text(0, "value").Split(' ').Concat(r.Text(1, "value").Split(' '))
            .Sum(v => double.Parse(v, System.Globalization.CultureInfo.InvariantCulture));
        var rate = new CensoredRate(8, length);
        Assert.Equal(r.Of("lambda_ml", "value"), rate.Rate, 1e-9);
        Assert.Equal(r.Of("lambda_95_low", "value"), rate.Limits.Low95, 1e-6);
        Assert.Equal(r.Of("lambda_95_high", "value"), rate.Limits.High95, 1e-6);
        Estimate gap = rate.MeanGap;
        Assert.Equal(r.Of("mean_spacing_ml", "value"), gap.Value, 1e-9);
        Assert.True(gap.Low95 < gap.Value && gap.Value < gap.High95);
    }
}
