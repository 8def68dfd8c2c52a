using CloudStruct.Maths.Directions;
using CloudStruct.Maths.Kernels;
using CloudStruct.Maths.Planar;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Width;
using CloudStruct.Stages.Drawings;
using CloudStruct.Tests.Products;

namespace CloudStruct.Tests.Stages.Drawings;

public class MapLayoutTests
{
    [Fact]
    public void Symbols_stay_apart_inside_the_window_and_loose_faces_have_none()
    {
        MapDrawing map = DrawnSamples.Drawn(DrawnSamples.Findings()).Map!;
        Assert.NotEmpty(map.Symbols);
        Assert.DoesNotContain(map.Symbols, s => s.FaceId == 5);   // in_place: no
        double apart = 0.0045 * map.Scale;   // bars of 4.4 mm at this scale
        for (int i = 0; i < map.Symbols.Length; i++)
        {
            MapSymbol a = map.Symbols[i];
            Assert.InRange(a.At.X, map.LeftM, map.RightM);
            Assert.InRange(a.At.Y, map.BottomM, map.TopM);
            for (int j = 0; j < i; j++)
                Assert.True(Math.Sqrt(Math.Pow(a.At.X - map.Symbols[j].At.X, 2) + Math.Pow(a.At.Y - map.Symbols[j].At.Y, 2)) > 0.8 * apart);
        }
    }

    [Fact]
    public void The_gap_between_two_stretches_of_a_margin_is_concealed()
    {
        MapDrawing map = DrawnSamples.Drawn(DrawnSamples.Findings()).Map!;
        MapLine gap = Assert.Single(map.Lines, l => l.Kind == "concealed");
        Assert.Equal("A", gap.Margin);
        Assert.Equal(3, map.Lines.Count(l => l.Kind == "contact"));
        Assert.Equal(TurnOf(map), map.UpAzimuthDeg);
    }

    [Fact]
    public void A_ring_that_crosses_itself_is_mended_and_triangles_cover_a_concave_one_once()
    {
        // A bow tie of two triangles of area 1 and 4: the larger stays.
        PlanarShape tie = PlanarShape.Of([new(0, 0), new(1, 1), new(1, -1), new(-2, 2), new(-2, -2)]);
        Assert.True(tie.Ring.Length >= 3);
        Assert.Equal(Area(tie.Ring), Covered(tie), 1e-9);
        Point2[] comb = [new(0, 0), new(7, 0), new(7, 3), new(5, 3), new(5, 1), new(4, 1), new(4, 3), new(2, 3), new(2, 1), new(0, 1)];
        PlanarShape shape = PlanarShape.Of(comb);
        Assert.Equal(10, shape.Ring.Length);
        Assert.Equal(15, Area(shape.Ring), 1e-9);   // 7 x 1 below, two teeth of 2 x 2
        Assert.Equal(15, Covered(shape), 1e-9);
        PlanarShape turned = PlanarShape.Of([.. comb.Reverse()]);
        Assert.Equal(15, Area(turned.Ring), 1e-9);   // counter-clockwise again
        Assert.Equal(3 * 8, shape.Triangles.Length);
        Assert.Empty(PlanarShape.Of([new(0, 0), new(1, 0)]).Ring);
        Assert.Empty(PlanarShape.Of([new(0, 0), new(1, 0), new(2, 0)]).Ring);
    }

    [Fact]
    public void A_slice_holds_what_a_plain_loop_finds()
    {
        var random = new Random(11);
        for (int n = 0; n < 70; n++)
        {
            float[] x = [.. Enumerable.Range(0, n).Select(_ => random.NextSingle() * 4)], y = [.. Enumerable.Range(0, n).Select(_ => random.NextSingle() * 4)];
            var found = new List<int>();
            VerticalSlice.Find(x, y, 2, 2, 0.6f, 0.8f, 0.3f, 1.5f, found);
            int[] plain = [.. Enumerable.Range(0, n).Where(i => MathF.Abs(((x[i] - 2) * 0.6f) + ((y[i] - 2) * 0.8f)) <= 0.3f && MathF.Abs(((x[i] - 2) * 0.8f) - ((y[i] - 2) * 0.6f)) <= 1.5f)];
            Assert.Equal(plain, found);
        }
    }

    [Fact]
    public void Sections_look_along_chainage_with_B_on_the_right()
    {
        DrawingsRecord drawn = DrawnSamples.Drawn(DrawnSamples.Findings());
        CrossSection section = drawn.Sections[0];
        Assert.True(section.Across.Length > 0);
        Assert.All(section.Across.Zip(section.Up), p => Assert.True(Math.Abs(p.First) < 20 && Math.Abs(p.Second) < 20));
        if (section is { AtA: { } a, AtB: { } b }) Assert.True(a.X < b.X);
    }

    [Fact]
    public void Laws_over_a_histogram_hold_as_many_stations_as_were_measured()
    {
        // Densities integrate to 1 (by definition); the bins hold every width once.
        var random = new Random(3);
        double[] widths = [.. Enumerable.Range(0, 60).Select(_ => Math.Exp(0.9 + (0.2 * (random.NextDouble() + random.NextDouble() + random.NextDouble() - 1.5))))];
        ThicknessLaw[] laws = [new(ThicknessLawKind.Lognormal, 0.9, 0.1, 0, 5), new(ThicknessLawKind.Weibull, 9, 2.6, 0, 7), new(ThicknessLawKind.Exponential, 2.5, null, 0, 90)];
        WidthHistogram h = Histograms.Of(widths, laws)!;
        Assert.Equal(60, h.Counts.Sum());
        Assert.InRange(h.Counts.Length, 4, 16);
        Assert.Equal(ThicknessLawKind.Lognormal, Assert.Single(h.Laws, l => l.Best).Kind);
        foreach (ThicknessLaw law in laws)
            Assert.Equal(1, Enumerable.Range(0, 40000).Sum(i => 0.001 * Histograms.Density(law, (i + 0.5) * 0.001)), 1e-3);
        Assert.Null(Histograms.Of(widths[..5], laws));
        Assert.Null(Histograms.Of([.. Enumerable.Repeat(2.0, 20)], laws));
    }

    [Fact]
    public void Equal_weights_give_the_plain_density_and_scale_does_not_matter()
    {
        Records.Frame.Vec3[] axes = [.. Enumerable.Range(0, 30).Select(i => new TrendPlunge(12 * i, (7 * i) % 90).ToVector())];
        SmoothDensity density = SmoothDensity.Vollmer(30);
        Records.Frame.Vec3 node = new TrendPlunge(40, 30).ToVector();
        double plain = density.Excess(axes, node);
        Assert.Equal(plain, density.Excess(axes, [.. axes.Select(_ => 1.0)], node), 1e-12);
        Assert.Equal(plain, density.Excess(axes, [.. axes.Select(_ => 7.5)], node), 1e-12);
        Assert.NotEqual(plain, density.Excess(axes, [.. axes.Select((_, i) => 1.0 + i)], node), 1e-3);
    }

    [Theory]
    [InlineData(0, 1)]
    [InlineData(45, 0.41421356237)]
    [InlineData(90, 0)]
    [InlineData(30, 0.57735026919)]
    public void The_equal_angle_net_puts_a_plunge_at_tan_of_half_its_distance_from_straight_down(double plunge, double radius)
    {
        // Stereographic projection: r = tan((90 - plunge)/2): tan 45, tan 22.5, 0, tan 30 (handbook values).
        Point2 p = EqualAngleNet.OfEqualArea(EqualAreaNet.OfDirection(new TrendPlunge(60, plunge).ToVector()));
        Assert.Equal(radius, Math.Sqrt((p.X * p.X) + (p.Y * p.Y)), 1e-9);
        if (plunge < 90) Assert.Equal(60, Math.Atan2(p.X, p.Y) * 180 / Math.PI, 1e-9);
    }

    [Fact]
    public void The_recipe_chooses_the_net_and_the_station_of_the_section()
    {
        Findings f = DrawnSamples.Findings();
        DrawingsRecord area = DrawnSamples.Drawn(f), angle = new DrawingsStage().Run(f, new DrawingSettings { Net = NetForm.EqualAngle, SectionStation = 3 }, CloudStruct.Records.Stages.StageContext.Plain());
        Assert.StartsWith("Equal area", area.Nets[0].Sentence, StringComparison.Ordinal);
        Assert.StartsWith("Equal angle", angle.Nets[0].Sentence, StringComparison.Ordinal);
        Assert.NotEqual(area.Nets[0].Poles[0].At, angle.Nets[0].Poles[0].At);
        Assert.Equal(3, Assert.Single(angle.Sections, s => s.OnSheet).Station);
        Assert.Single(area.Sections, s => s.OnSheet);
        Assert.Equal("nets-dike-host", area.NetSheets[0].Name);
    }

    private static double TurnOf(MapDrawing map) => map.NorthIsTrue ? 0.42 : 0;

    private static double Area(Point2[] ring) =>
        Enumerable.Range(0, ring.Length).Sum(i => (ring[i].X * ring[(i + 1) % ring.Length].Y) - (ring[(i + 1) % ring.Length].X * ring[i].Y)) / 2;

    private static double Covered(PlanarShape s) =>
        Enumerable.Range(0, s.Triangles.Length / 3).Sum(t => Area([s.Ring[s.Triangles[3 * t]], s.Ring[s.Triangles[(3 * t) + 1]], s.Ring[s.Triangles[(3 * t) + 2]]]));
}
