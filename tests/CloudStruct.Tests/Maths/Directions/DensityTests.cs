using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Directions;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Maths.Directions;

public class DensityTests
{
    private const double Degree = Math.PI / 180;

    // Formulas of Kamb 1959 and Vollmer 1995, evaluated outside this program (numpy).
    [Fact]
    public void Circles_and_kernels_agree_with_the_table()
    {
        ReferenceTable r = ReferenceTable.Read("reference/kamb_table.csv");
        for (int i = 0; i < r.Count; i++)
        {
            int n = (int)r.Number(i, "n");
            var circle = new CountingCircle(n);
            Assert.Equal(r.Number(i, "area_fraction"), circle.AreaFraction, 1e-8);
            Assert.Equal(r.Number(i, "cap_half_angle_deg"), Math.Acos(circle.Cosine) / Degree, 1e-8);
            Assert.Equal(r.Number(i, "expected"), circle.Expected, 1e-8);
            Assert.Equal(r.Number(i, "sigma"), circle.Sigma, 1e-8);
            Assert.Equal(3, circle.Expected / circle.Sigma, 1e-9);
            SmoothDensity smooth = SmoothDensity.Vollmer(n);
            Assert.Equal(r.Number(i, "exp_k"), smooth.K, 1e-8);
            Assert.Equal(r.Number(i, "exp_expected"), smooth.Expected, 1e-8);
            Assert.Equal(r.Number(i, "exp_sigma"), smooth.Sigma, 1e-8);
            Assert.Equal(3, smooth.Expected / smooth.Sigma, 1e-9);
        }
    }

    // 12 planes printed as a problem in Wessel, Data Analysis 1, ch. 9; counts and sums at 5 nodes by numpy.
    [Fact]
    public void Counts_and_sums_at_five_nodes_agree_with_numpy()
    {
        Vec3[] poles = Poles();
        ReferenceTable r = ReferenceTable.Read("reference/density_nodes.csv");
        var circle = new CountingCircle(poles.Length);
        SmoothDensity smooth = SmoothDensity.Vollmer(poles.Length);
        for (int i = 0; i < r.Count; i++)
        {
            Vec3 node = new TrendPlunge(r.Number(i, "trend"), r.Number(i, "plunge")).ToVector();
            Assert.Equal(r.Number(i, "count_1pct"), CountingCircle.Count(poles, node, 0.99));
            int count = circle.Count(poles, node);
            Assert.Equal(r.Number(i, "kamb_count"), count);
            Assert.Equal(r.Number(i, "kamb_excess_sigma"), (count - circle.Expected) / circle.Sigma, 1e-9);
            double sum = smooth.Sum(poles, node);
            Assert.Equal(r.Number(i, "exp_sum"), sum, 1e-9);
            Assert.Equal(r.Number(i, "exp_excess_sigma"), smooth.Excess(poles, node), 1e-9);
            Assert.Equal(r.Number(i, "exp_multiple_of_uniform"), sum / smooth.Expected, 1e-9);
        }
    }

    // Law: over the hemisphere the multiple of uniform averages to 1 - exp(-k).
    [Fact]
    public void Density_averages_to_uniform_over_the_net()
    {
        Vec3[] poles = Poles();
        SmoothDensity smooth = SmoothDensity.Vollmer(poles.Length);
        double sum = 0;
        int nodes = 0;
        for (int i = -150; i <= 150; i++)
        {
            for (int j = -150; j <= 150; j++)
            {
                var p = new Point2((i + 0.5) / 150, (j + 0.5) / 150);
                if ((p.X * p.X) + (p.Y * p.Y) > 1) continue;
                sum += smooth.Sum(poles, EqualAreaNet.Direction(p)) / smooth.Expected;
                nodes++;
            }
        }

        Assert.Equal(1 - Math.Exp(-smooth.K), sum / nodes, 1e-3);
    }

    // An axis near the rim is as near to the opposite rim.
    [Theory]
    [InlineData(5)]
    [InlineData(99)]
    public void A_pole_at_the_rim_raises_the_density_opposite(int n)
    {
        Vec3[] pole = [new TrendPlunge(10, 1).ToVector()];
        SmoothDensity smooth = SmoothDensity.Vollmer(n);
        double own = smooth.Sum(pole, new TrendPlunge(10, 1).ToVector()), opposite = smooth.Sum(pole, new TrendPlunge(190, 1).ToVector());
        Assert.True(opposite > own / 2);
    }

    [Fact]
    public void Every_contour_vertex_has_the_density_of_its_level()
    {
        Vec3[] axes = Cluster(200, new TrendPlunge(40, 2), 60);
        SmoothDensity density = SmoothDensity.ForDrawing(axes.Length);
        NetContours contours = NetContours.Of(axes, density, 2, CancellationToken.None);
        double[] levels = contours.Levels();
        Assert.InRange(levels.Length, 3, 7);
        foreach (double level in levels)
        {
            IReadOnlyList<Point2[]> curves = contours.Curves(level);
            Assert.NotEmpty(curves);
            foreach (Point2 p in curves.SelectMany(c => c))
            {
                Assert.True((p.X * p.X) + (p.Y * p.Y) <= 1 + 1e-12);

                // Straight edges of cells a sixth of the kernel wide: within 2 % of the peak.
                Assert.Equal(level, density.Excess(axes, EqualAreaNet.Direction(p)), 0.02 * contours.Highest);
            }
        }
    }

    [Fact]
    public void A_contour_cut_by_the_rim_goes_on_opposite()
    {
        Vec3[] axes = Cluster(200, new TrendPlunge(40, 2), 60);
        NetContours contours = NetContours.Of(axes, SmoothDensity.ForDrawing(axes.Length), 2, CancellationToken.None);
        Point2[] ends = [.. contours.Curves(contours.Levels()[0]).Where(c => c[0] != c[^1]).SelectMany(c => new[] { c[0], c[^1] })];
        Assert.True(ends.Length >= 4);
        foreach (Point2 e in ends)
        {
            Assert.Equal(1, Math.Sqrt((e.X * e.X) + (e.Y * e.Y)), 1e-9);
            Assert.Contains(ends, o => Math.Abs(o.X + e.X) < 0.005 && Math.Abs(o.Y + e.Y) < 0.005);
        }
    }

    [Fact]
    public void Threads_change_no_contour()
    {
        Vec3[] axes = Cluster(300, new TrendPlunge(140, 50), 30);
        SmoothDensity density = SmoothDensity.ForDrawing(axes.Length);
        Point2[][] one = [.. NetContours.Of(axes, density, 1, CancellationToken.None).Curves(4)];
        Point2[][] four = [.. NetContours.Of(axes, density, 4, CancellationToken.None).Curves(4)];
        Assert.Equal(one, four);
    }

    // A cone on a flat ground: its level curve is a circle of known radius.
    [Fact]
    public void Level_curve_of_a_cone_is_one_closed_circle()
    {
        double[] values = new double[41 * 41];
        for (int i = 0; i < values.Length; i++) values[i] = 30 - Math.Sqrt(Math.Pow((i % 41) - 20.3, 2) + Math.Pow((i / 41) - 19.8, 2));
        Point2[] curve = Assert.Single(LevelCurves.Trace(values, 41, 18));
        Assert.Equal(curve[0], curve[^1]);
        foreach (Point2 p in curve) Assert.Equal(12, Math.Sqrt(Math.Pow(p.X - 20.3, 2) + Math.Pow(p.Y - 19.8, 2)), 0.05);
    }

    [Fact]
    public void Saddles_and_borders_leave_no_loose_ends_inside()
    {
        double[] values = new double[30 * 30];
        for (int i = 0; i < values.Length; i++) values[i] = Math.Sin(i % 30 * 0.7) * Math.Sin(i / 30 * 0.9);
        foreach (Point2[] c in LevelCurves.Trace(values, 30, 0.0001))
        {
            bool closed = c[0] == c[^1];
            Assert.True(closed || (OnBorder(c[0]) && OnBorder(c[^1])));
        }

        static bool OnBorder(Point2 p) => p.X is 0 or 29 || p.Y is 0 or 29;
    }

    private static Vec3[] Poles()
    {
        ReferenceTable t = ReferenceTable.Read("reference/density_poles.csv");
        return [.. Enumerable.Range(0, t.Count).Select(i => new CloudStruct.Records.Attitudes.Attitude(t.Number(i, "strike_rhr"), t.Number(i, "dip")).UpwardNormal())];
    }

    internal static Vec3[] Cluster(int n, TrendPlunge about, double kappa, ulong seed = 3)
    {
        var axes = new Vec3[n];
        for (int i = 0; i < n; i++)
        {
            var draws = new Draws(seed, 11, (ulong)i);
            axes[i] = Fisher.Draw(about.ToVector(), kappa, ref draws);
        }

        return axes;
    }
}
