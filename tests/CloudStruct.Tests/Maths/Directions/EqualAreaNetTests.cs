using CloudStruct.Maths.Directions;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using CloudStruct.Tests.Kit;
using CsCheck;

namespace CloudStruct.Tests.Maths.Directions;

public class EqualAreaNetTests
{
    private const double Degree = Math.PI / 180;

    // J. P. Snyder 1987, USGS Prof. Paper 1395, pp. 332-333: R 3, centre 40 N 100 W, point 20 S 100 E; printed to 1e-7.
    [Fact]
    public void Worked_example_of_Snyder_comes_out_forward_and_back()
    {
        Point2 p = Oblique(40, -100, -20, 100, 3);
        ReferenceTable t = ReferenceTable.Read("reference/laea_snyder.csv");
        Assert.Equal(t.Of("x", "published"), p.X, 1e-7);
        Assert.Equal(t.Of("y", "published"), p.Y, 1e-7);

        double unit = 3 * Math.Sqrt(2);
        (double lat, double lon) = ObliqueBack(40, -100, new Point2(t.Of("x", "published") / unit, t.Of("y", "published") / unit));
        Assert.Equal(-20, lat, 1e-6);
        Assert.Equal(100, lon, 1e-6);
    }

    // PROJ 9.1.1, +proj=laea on the unit sphere at three centres.
    [Fact]
    public void Oblique_centres_agree_with_PROJ()
    {
        ReferenceTable t = ReferenceTable.Read("reference/laea_proj_oblique.csv");
        for (int i = 0; i < t.Count; i++)
        {
            Point2 p = Oblique(t.Number(i, "lat0"), t.Number(i, "lon0"), t.Number(i, "lat"), t.Number(i, "lon"), 1);
            Assert.Equal(t.Number(i, "x"), p.X, 1e-10);
            Assert.Equal(t.Number(i, "y"), p.Y, 1e-10);
        }
    }

    // PROJ 9.1.1, south-polar aspect with R = 1/√2: the lower-hemisphere net of radius 1.
    [Fact]
    public void Lower_hemisphere_net_agrees_with_PROJ()
    {
        ReferenceTable t = ReferenceTable.Read("reference/laea_proj_grid.csv");
        Assert.Equal(84, t.Count);
        for (int i = 0; i < t.Count; i++)
        {
            Vec3 v = new TrendPlunge(t.Number(i, "trend_deg"), t.Number(i, "plunge_deg")).ToVector();
            Point2 p = EqualAreaNet.OfDirection(v);
            Assert.Equal(t.Number(i, "x_east"), p.X, 1e-11);
            Assert.Equal(t.Number(i, "y_north"), p.Y, 1e-11);
        }
    }

    // Snyder 1987 eq. 24-3 with the radius scaled to 1 at the horizon.
    [Theory]
    [InlineData(90, 1)]
    [InlineData(45, 0.541196)]
    [InlineData(60, 0.707107)]
    [InlineData(0, 0)]
    public void Radius_is_root_two_times_the_sine_of_half_the_angle(double fromDownDeg, double radius)
    {
        Point2 p = EqualAreaNet.OfDirection(new TrendPlunge(77, 90 - fromDownDeg).ToVector());
        Assert.Equal(radius, Math.Sqrt((p.X * p.X) + (p.Y * p.Y)), 1e-6);
    }

    // The cap of half-angle c holds 1 - cos c of the hemisphere, and its disc the same share of the net.
    [Fact]
    public void Area_is_kept() => Gen.Double[0.01, 90].Sample(c =>
    {
        Point2 p = EqualAreaNet.OfDirection(new TrendPlunge(0, 90 - c).ToVector());
        Assert.Equal(1 - Math.Cos(c * Degree), (p.X * p.X) + (p.Y * p.Y), 1e-12);
    });

    [Fact]
    public void Every_axis_comes_back_whichever_end_was_given() =>
        Gen.Select(Gen.Double[0, 359.999], Gen.Double[0, 90]).Sample((trend, plunge) =>
        {
            Vec3 v = new TrendPlunge(trend, plunge).ToVector();
            Vec3 back = EqualAreaNet.Direction(EqualAreaNet.OfAxis(-v));
            Assert.Equal(1, Math.Abs(back.Dot(v)), 1e-12);
            Assert.True(back.Z <= 1e-12);
        });

    [Fact]
    public void A_turn_to_true_north_turns_the_trend_by_as_much()
    {
        Vec3 v = new TrendPlunge(30, 20).ToVector();
        Point2 turned = EqualAreaNet.OfAxis(v, 2.5), expected = EqualAreaNet.OfAxis(new TrendPlunge(32.5, 20).ToVector());
        Assert.Equal(expected.X, turned.X, 1e-12);
        Assert.Equal(expected.Y, turned.Y, 1e-12);
        Assert.Equal(32.5, TrendPlunge.OfAxis(-v, 2.5).TrendDeg, 1e-9);
        Assert.Equal(20, TrendPlunge.OfAxis(-v, 2.5).PlungeDeg, 1e-9);
    }

    // Any centre: its direction plays "straight down", its north plays y. On the unit sphere the radius is 2 sin(c/2), √2 times ours.
    private static Point2 Oblique(double lat0, double lon0, double lat, double lon, double r)
    {
        (Vec3 down, Vec3 north, Vec3 east) = Centre(lat0, lon0);
        Vec3 v = OnGlobe(lat, lon);
        Point2 p = EqualAreaNet.OfDirection(new Vec3(v.Dot(east), v.Dot(north), -v.Dot(down)));
        return new Point2(p.X * Math.Sqrt(2) * r, p.Y * Math.Sqrt(2) * r);
    }

    private static (double Lat, double Lon) ObliqueBack(double lat0, double lon0, Point2 p)
    {
        (Vec3 down, Vec3 north, Vec3 east) = Centre(lat0, lon0);
        Vec3 d = EqualAreaNet.Direction(p);
        Vec3 v = (east * d.X) + (north * d.Y) - (down * d.Z);
        return (Math.Asin(v.Z) / Degree, Math.Atan2(v.Y, v.X) / Degree);
    }

    private static (Vec3 Down, Vec3 North, Vec3 East) Centre(double lat0, double lon0)
    {
        Vec3 down = OnGlobe(lat0, lon0), east = new(-Math.Sin(lon0 * Degree), Math.Cos(lon0 * Degree), 0);
        return (down, down.Cross(east), east);
    }

    private static Vec3 OnGlobe(double lat, double lon) => new(
        Math.Cos(lat * Degree) * Math.Cos(lon * Degree), Math.Cos(lat * Degree) * Math.Sin(lon * Degree), Math.Sin(lat * Degree));
}
