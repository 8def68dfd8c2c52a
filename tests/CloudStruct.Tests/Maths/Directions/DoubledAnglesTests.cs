using CloudStruct.Maths.Directions;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Maths.Directions;

public class DoubledAnglesTests
{
    // P. Wessel, Data Analysis 1, ch. 9: 13 strikes; printed sums 1.2972 and -10.349, doubled mean 277, R 0.802, axis 138.5,
    // kappa 2.897 from his table, standard error 5.2, limits 10.2; digits by R package circular.
    [Fact]
    public void Thirteen_strikes_have_the_printed_axis()
    {
        DoubledAngles a = DoubledAngles.Of(ReferenceTable.Read("reference/axial_input_strikes13.csv").Column("strike_deg"));
        Assert.Equal(1.2972, a.SumCosine, 0.00005);
        Assert.Equal(-10.349, a.SumSine, 0.001);
        Assert.Equal(0.802, a.MeanLength, 0.0005);
        Assert.Equal(138.572147, a.MeanAxisDeg, 1e-6);
        Assert.Equal(2.897, new DoubledAngles(13, 13 * 0.802, 0).Kappa, 0.002);
        Assert.Equal(5.2, a.StandardErrorDeg, 0.05);
        Assert.Equal(10.2, 1.96 * a.StandardErrorDeg, 0.05);
        Assert.Equal(3.538676e-5, a.RayleighP, 1e-10);
    }

    // R's mle.vonmises prints 2.890945: that is the closed approximation -0.4 + 1.39 R + 0.43/(1 - R) of N. I. Fisher 1993, not the
    // maximum itself. Ours is held against the definition, the ratio of two integrals over the circle.
    [Fact]
    public void Concentration_solves_its_own_equation_and_lies_near_the_closed_approximation()
    {
        const double r = 0.80235932;
        double kappa = new DoubledAngles(13, 13 * r, 0).Kappa, above = 0, below = 0;
        for (int i = 0; i < 1000; i++)
        {
            double c = Math.Cos(2 * Math.PI * (i + 0.5) / 1000), e = Math.Exp(kappa * c);
            above += c * e;
            below += e;
        }

        Assert.Equal(r, above / below, 1e-10);
        Assert.Equal(2.890945, -0.4 + (1.39 * r) + (0.43 / (1 - r)), 1e-6);
        Assert.Equal(2.890945, kappa, 0.01);
    }

    // N. I. Fisher 1993, sets B.2 and B.5: long axes of feldspar laths; R package circular and its four-term series.
    [Theory]
    [InlineData("fisher1993_b2", 133, 35.946695, 0.11867939, 0.153689)]
    [InlineData("fisher1993_b5", 60, 19.877641, 0.23702169, 0.033691)]
    public void Feldspar_laths_agree_with_R(string file, int n, double axis, double length, double p)
    {
        DoubledAngles a = DoubledAngles.Of(ReferenceTable.Read($"reference/{file}.csv").Column("axis_deg"));
        Assert.Equal(n, a.N);
        Assert.Equal(axis, a.MeanAxisDeg, 1e-6);
        Assert.Equal(length, a.MeanLength, 1e-8);
        Assert.Equal(p, a.RayleighP, 1e-6);
    }

    // Critical mean length of 13 axes at 5 %: 0.475 (Wessel, ch. 9).
    [Fact]
    public void Thirteen_axes_are_just_significant_at_a_mean_length_of_0475()
    {
        Assert.True(new DoubledAngles(13, 13 * 0.4755, 0).RayleighP < 0.05);
        Assert.True(new DoubledAngles(13, 13 * 0.4695, 0).RayleighP > 0.05);
    }

    [Fact]
    public void An_axis_has_no_head()
    {
        DoubledAngles a = DoubledAngles.Of([10, 20, 200, 15]), b = DoubledAngles.Of([190, 20, 20, 195]);
        Assert.Equal(a.MeanAxisDeg, b.MeanAxisDeg, 1e-12);
    }

    // 733 mapped dike segments: axial mean azimuth 83.2 (R 0.342), computed outside this program.
    [Fact]
    public void Mapped_dikes_have_the_mean_trend_of_an_independent_calculation()
    {
        ReferenceTable t = ReferenceTable.Read("orientations/dike_segments.csv");
        double[] azimuth = [.. Enumerable.Range(0, t.Count).Select(i =>
            Math.Atan2(t.Number(i, "x_end_m") - t.Number(i, "x_start_m"), t.Number(i, "y_end_m") - t.Number(i, "y_start_m")) * 180 / Math.PI)];
        DoubledAngles mean = DoubledAngles.Of(azimuth);
        Assert.Equal(83.2, mean.MeanAxisDeg, 0.05);
        Assert.Equal(0.342, mean.MeanLength, 0.0005);
    }
}
