using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Directions;
using CloudStruct.Maths.Rates;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Width;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Maths.Rates;

public class SamplingTests
{
    // Terzaghi 1965 (form 1/sin; values computed outside this program): 30 deg gives 2, 15 deg 3.8637, the cap of 10 is reached at 5.739 deg.
    [Fact]
    public void Weights_of_planes_along_a_line_agree_with_the_table()
    {
        ReferenceTable r = ReferenceTable.Read("reference/terzaghi_weights.csv");
        for (int i = 0; i < r.Count; i++)
        {
            double angle = r.Number(i, "angle_plane_to_line_deg");
            Assert.Equal(r.Number(i, "weight"), Terzaghi.Weight(angle, double.MaxValue), 1e-9 * r.Number(i, "weight"));
            Assert.Equal(r.Number(i, "weight_capped_10"), Terzaghi.Weight(angle), 1e-9);
        }

        Assert.Equal(10, Terzaghi.Weight(5.7), 1e-12);
        Assert.True(Terzaghi.Weight(5.75) < 10);
    }

    // Priest and Hudson 1976; Palmstrom 2005 (coefficients from memory). Values computed outside this program.
    [Fact]
    public void Rock_quality_agrees_with_the_tables()
    {
        ReferenceTable r = ReferenceTable.Read("reference/rqd_priest_hudson.csv"), j = ReferenceTable.Read("reference/jv_rqd.csv");
        for (int i = 0; i < r.Count; i++) Assert.Equal(r.Number(i, "RQD_exponential"), RockQuality.FromFrequency(r.Number(i, "lambda_per_m")), 1e-6);
        for (int i = 0; i < j.Count; i++) Assert.Equal(j.Number(i, "RQD_110_2.5"), RockQuality.FromJointCount(j.Number(i, "Jv")), 1e-9);
    }

    // Hand check with n 20, m 10, r 2; 400 simulated windows of radius 1: density 7.94 (truth 8), P21 5.626 (5.6), length 0.7085 (0.7).
    [Fact]
    public void Circular_windows_agree_with_the_hand_check_and_the_simulation()
    {
        var hand = new CircularWindow(2, 20, 10);
        Assert.Equal(0.39788735773, hand.Density, 1e-9);
        Assert.Equal(2.5, hand.Intensity, 1e-12);
        Assert.Equal(6.28318530718, hand.MeanLengthM, 1e-9);
        var simulated = new CircularWindow(1, 22.5025, 49.8875);
        Assert.Equal(7.9398422235, simulated.Density, 1e-8);
        Assert.Equal(5.625625, simulated.Intensity, 1e-9);
        Assert.Equal(0.708531081808, simulated.MeanLengthM, 1e-9);
        Assert.Equal(double.PositiveInfinity, new CircularWindow(1, 3, 0).MeanLengthM);
    }

    // Integrals over Fisher's law computed outside this program; isotropic 1/2 and π/4. Ours from a drawn sample: 5 standard errors.
    [Fact]
    public void Line_and_surface_factors_of_a_Fisher_set_agree_with_the_integrals()
    {
        ReferenceTable r = ReferenceTable.Read("reference/p32_factors.csv");
        for (int i = 0; i < r.Count; i++)
        {
            double kappa = r.Number(i, "kappa"), theta = r.Number(i, "theta_deg") * Math.PI / 180;
            var at = new Vec3(Math.Sin(theta), 0, Math.Cos(theta));
            Vec3[] poles = new Vec3[20_000];
            for (int k = 0; k < poles.Length; k++)
            {
                var d = new Draws(1, 3, (ulong)k);
                poles[k] = Fisher.Draw(Vec3.Up, Math.Max(1e-6, kappa), ref d);
            }

            double[] ones = [.. poles.Select(_ => 1.0)];
            Assert.Equal(r.Number(i, "P10_over_P32"), Intensity.LineFactor(poles, ones, at), 0.011);
            Assert.Equal(r.Number(i, "P21_over_P32_for_plane_normal_at_theta"), Intensity.SurfaceFactor(poles, ones, at), 0.011);
        }
    }

    // Geometry: one parallel set of spacing s gives cos(a)/s on a line at a to its normal, sin(g)/s on a plane at g.
    [Fact]
    public void A_parallel_set_has_the_factors_of_plain_geometry()
    {
        for (double a = 0; a <= 90; a += 15)
        {
            var at = new Vec3(Math.Sin(a * Math.PI / 180), 0, Math.Cos(a * Math.PI / 180));
            Assert.Equal(Math.Cos(a * Math.PI / 180), Intensity.LineFactor([Vec3.Up], [1], at), 1e-12);
            Assert.Equal(Math.Sin(a * Math.PI / 180), Intensity.SurfaceFactor([Vec3.Up], [1], at), 1e-12);
        }
    }

    // Priest and Hudson 1981 (from memory): 100 exponential gaps give ±20 % at 95 %.
    [Fact]
    public void A_hundred_separate_gaps_give_a_fifth()
    {
        Estimate e = ClusteredRate.MeanGap([.. Enumerable.Repeat((5.0, 10.0), 20)], 100)!;
        Assert.Equal(2, e.Value, 1e-12);
        Assert.Equal(0.196, Math.Log(e.High95 / e.Value), 1e-9);
        Assert.Null(ClusteredRate.MeanGap([(0, 10)], 0));
    }

    // Sampling: gaps of an exponential law on 12 lines each. Binomial: 0.95 of 1000 has a standard error of 0.007.
    [Fact]
    public void Limits_of_a_rate_hold_the_truth_in_19_of_20()
    {
        int inside = 0;
        for (ulong s = 1; s <= 1000; s++)
        {
            var d = new Draws(s, 41, 0);
            var lines = new List<(double, double)>();
            int all = 0;
            for (int l = 0; l < 12; l++)
            {
                double length = 3 + (5 * d.NextUnit()), at = 0;
                int met = 0;
                while ((at -= 0.5 * Math.Log(1 - d.NextUnit())) < length) met++;
                lines.Add((met, length));
                all += met;
            }

            Estimate e = ClusteredRate.MeanGap(lines, all)!;
            if (e.Low95 <= 0.5 && 0.5 <= e.High95) inside++;
        }

        Assert.InRange(inside / 1000.0, 0.93, 0.99);
    }
}
