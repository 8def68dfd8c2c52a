using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Directions;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Frame;

namespace CloudStruct.Tests.Maths.Directions;

public class PoleRegionsTests
{
    private const double Degree = Math.PI / 180;

    // H. L. Harter 1960, Circular error probabilities, J. Am. Stat. Assoc. 55: 95 % radius over the larger deviation (from memory).
    // The ends are the standard quantiles of the normal (1.95996) and of chi-square with 2 degrees of freedom (2.44775).
    [Theory]
    [InlineData(0.0, 1.95996)]
    [InlineData(0.1, 1.96253)]
    [InlineData(0.5, 2.03586)]
    [InlineData(0.8, 2.23029)]
    [InlineData(1.0, 2.44775)]
    public void Circle_of_95_percent_follows_the_table_of_circular_errors(double ratio, double factor)
    {
        Assert.Equal(factor, PoleRegions.Cone95(1, ratio), 0.00001);
        Assert.Equal(3 * factor, PoleRegions.Cone95(3 * ratio, 3), 0.00003);
    }

    [Fact]
    public void Ellipse_and_rake_come_back_from_the_covariance_that_was_put_in()
    {
        Vec3 n = new Attitude(40, 60).UpwardNormal();
        (Vec3 along, Vec3 down) = PoleRegions.StrikeAndDip(n);
        double rake = 25 * Degree;
        Vec3 major = (along * Math.Cos(rake)) + (down * Math.Sin(rake)), minor = n.Cross(major);
        Symmetric3 c = Symmetric3.Outer(major, Math.Pow(2 * Degree, 2)) + Symmetric3.Outer(minor, Math.Pow(0.5 * Degree, 2));

        PoleRegion r = PoleRegions.From(-n, c, new ModelReference());

        Assert.Equal(2 * 2.44775, r.Ellipse95MajorDeg, 0.0001);
        Assert.Equal(0.5 * 2.44775, r.Ellipse95MinorDeg, 0.0001);
        Assert.Equal(25, r.Ellipse95RakeDeg, 1e-9);
        Assert.Equal(1, Math.Abs(r.MajorAxis.Dot(major)), 1e-12);
        Assert.Equal(r.Cone95Deg, r.Cone95TotalDeg);
    }

    [Fact]
    public void Strike_direction_lies_at_the_strike_and_the_down_direction_at_the_dip()
    {
        var a = new Attitude(312, 81);
        (Vec3 along, Vec3 down) = PoleRegions.StrikeAndDip(a.UpwardNormal());
        Assert.Equal(312, Azimuth.Of(along), 1e-9);
        Assert.Equal(42, Azimuth.Of(down), 1e-9);
        Assert.Equal(81, Math.Asin(-down.Z) / Degree, 1e-9);
    }

    // Slow twin: turn the model at random about its three axes and look where the normals go.
    [Theory]
    [InlineData(0, 0)]
    [InlineData(35, 20)]
    [InlineData(120, 88)]
    public void Total_cone_holds_95_percent_of_randomly_turned_models(double strike, double dip)
    {
        Vec3 n = new Attitude(strike, dip).UpwardNormal();
        var reference = new ModelReference { TiltSigmaDeg = 0.3, AzimuthSigmaDeg = 1.0 };
        double cone = PoleRegions.From(n, default, reference).Cone95TotalDeg;
        int inside = 0;
        const int Count = 40_000;
        for (int i = 0; i < Count; i++)
        {
            var d = new Draws(7, 1, (ulong)i);
            Vec3 turn = new Vec3(d.NextNormal() * 0.3, d.NextNormal() * 0.3, d.NextNormal()) * Degree;
            Vec3 turned = (n + turn.Cross(n)).Unit();
            if (Math.Atan2(turned.Cross(n).Length, turned.Dot(n)) / Degree <= cone) inside++;
        }

        Assert.Equal(0.95, (double)inside / Count, 0.0045);   // four standard errors of a share of 0.95 in 40,000
    }

    [Fact]
    public void Azimuth_error_moves_steep_planes_only()
    {
        var reference = new ModelReference { AzimuthSigmaDeg = 1.0 };
        Assert.Equal(0, PoleRegions.From(Vec3.Up, default, reference).Cone95TotalDeg, 1e-12);
        Assert.Equal(1.95996, PoleRegions.From(new Vec3(1, 0, 0), default, reference).Cone95TotalDeg, 0.0001);
    }

    [Fact]
    public void Nothing_known_is_a_cone_of_90_and_weak()
    {
        PoleRegion r = PoleRegions.From(Vec3.Up, new Symmetric3(100, 0, 0, 100, 0, 0), new ModelReference());
        Assert.Equal(90, r.Cone95Deg);
        Assert.Equal(Grade.Weak, r.Grade);
    }
}
