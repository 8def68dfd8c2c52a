using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;
using CloudStruct.Tests.Kit;
using Xunit.Abstractions;

namespace CloudStruct.Tests.Maths.Fitting;

public class NoiseLawsTests(ITestOutputHelper output)
{
    private const double Degree = Math.PI / 180;

    // plane_correlated_noise.csv holds the exact error; the raster must give the same from its pair sums.
    [Theory]
    [InlineData(0.2)]
    [InlineData(0.5)]
    [InlineData(1.0)]
    public void Pair_sums_on_the_raster_give_the_exact_sandwich(double length)
    {
        (double[] u, double[] v) = PlaneErrorsTests.Grid20();
        double[] one = [.. u.Select(_ => 1.0)];
        var bins = new LagBins(0.02, 5);
        PatchRecord p = new PatchModes(bins, 0.1).Record(u, v, new double[400], one)!;
        double sum = 0;
        for (int b = 0; b < bins.Count; b++) sum += Math.Exp(-bins.DistanceM[b] / length) * p.LagSums[(b * PatchRecord.Lanes) + 1];

        Symmetric3 exact = PlaneErrors.Sandwich(u, v, d => Math.Exp(-d / length));
        Assert.Equal(1, sum / (p.SpreadU * p.SpreadU) / exact.Yy, 0.04);
    }

    // plane_bootstrap.csv: noise exp(-d / 0.2 m) on that grid; ratio of the stated to the true standard error over 60 fields.
    // Independent formula 0.25, block bootstrap 0.69, variogram 0.94, REML with the right shape 1.07 (numpy, scipy).
    // Ours does not know shape, length or nugget.
    [Fact]
    public void Stated_error_of_the_slope_is_right_on_average_without_knowing_the_law()
    {
        (double[] u, double[] v) = PlaneErrorsTests.Grid20();
        double[] one = [.. u.Select(_ => 1.0)];
        var field = new NoiseField(u, v, d => 1e-4 * Math.Exp(-d / 0.2));
        var bins = new LagBins(0.02, 5);
        var modes = new PatchModes(bins, 0.1);
        var laws = new NoiseLaws(bins, 0.05, 1.0);
        NoisePrior prior = laws.Flat(1e-4, 4);
        double trueSe = ReferenceTable.Read("reference/plane_bootstrap.csv").Number(0, "true_se_deg");
        double sum = 0, naive = 0;
        int inside = 0;
        const int Fields = 60;
        for (ulong f = 0; f < Fields; f++)
        {
            double[] r = field.Draw(5, f);
            (double a, double b) = Detrend(u, v, r);
            PatchRecord p = modes.Record(u, v, r, one)!;
            SlopeError e = laws.Slopes(laws.Weigh(p, prior.Variance, prior.Freedom), prior);
            sum += Math.Sqrt((e.VarianceU + e.VarianceV) / 2) / Degree / Fields;
            naive += Math.Sqrt(p.MeanSquare / 400) / p.SpreadU / Degree / Fields;
            if (Math.Sqrt((a * a) + (b * b)) < 2.4477 * e.Stretch * Math.Sqrt((e.VarianceU + e.VarianceV) / 2)) inside++;
        }

        output.WriteLine($"stated over true {sum / trueSe:F3}, independent formula {naive / trueSe:F3}, covered {inside} of {Fields}");
        Assert.InRange(sum / trueSe, 0.8, 1.25);
        Assert.InRange(naive / trueSe, 0.2, 0.3);
        Assert.InRange(inside, 52, 60);   // 57 expected; 52 or fewer has a chance of 0.02
    }

    /// <summary>Takes the least-squares plane out of r; gives the slopes, which are pure error here.</summary>
    private static (double A, double B) Detrend(double[] u, double[] v, double[] r)
    {
        double mu = u.Average(), mv = v.Average(), mr = r.Average(), uu = 0, vv = 0, ur = 0, vr = 0;
        for (int i = 0; i < u.Length; i++)
        {
            uu += (u[i] - mu) * (u[i] - mu);
            vv += (v[i] - mv) * (v[i] - mv);
            ur += (u[i] - mu) * r[i];
            vr += (v[i] - mv) * r[i];
        }

        double a = ur / uu, b = vr / vv;   // the grid is square to its axes
        for (int i = 0; i < u.Length; i++) r[i] -= mr + (a * (u[i] - mu)) + (b * (v[i] - mv));
        return (a, b);
    }
}
