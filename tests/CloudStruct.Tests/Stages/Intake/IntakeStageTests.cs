using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Stages.Intake;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Stages.Intake;

public class IntakeStageTests
{
    private static readonly Vec3 Utm = new(432_567, 6_651_234, 412);
    private static readonly CrsInfo Projected = new() { Kind = CrsKind.Projected, Name = "WGS 84 / UTM zone 32N", Epsg = 32632 };

    [Fact]
    public void Local_coordinates_are_small_and_lead_back_to_the_map()
    {
        Vec3[] places = Clouds.Patch(Utm, new Vec3(0, 0.3, 1), 20, 20, 5000, 1);
        IPieces pieces = Clouds.Intake(Clouds.Survey(new MemorySource(places)));
        List<Vec3> local = Clouds.All(pieces);
        Assert.Equal(5000, local.Count);
        Assert.Equal(5000, pieces.Record.Points);
        Vec3 origin = pieces.Record.Frame.Origin;
        Assert.Equal(origin, new Vec3(Math.Round(origin.X), Math.Round(origin.Y), Math.Round(origin.Z)));
        for (int i = 0; i < 5000; i++)
        {
            Assert.True(local[i].Length < 30);
            Assert.True((pieces.Record.Frame.ToMap(local[i]) - places[i]).Length < 2e-6);
        }
    }

    // checks.md X12 (numpy): float32 steps by 0.0625 m at 600000 and by 0.5 m at 6600000.
    [Fact]
    public void Float_coordinates_beyond_their_precision_are_refused_and_fine_ones_pass()
    {
        Assert.Equal(0.0625f, MathF.BitIncrement(600_000f) - 600_000f);
        Assert.Equal(0.5f, MathF.BitIncrement(6_600_000f) - 6_600_000f);
        Vec3[] far = Clouds.Patch(Utm, new Vec3(0, 0, 1), 20, 20, 500, 1), near = Clouds.Patch(new Vec3(500, 800, 10), new Vec3(0, 0, 1), 20, 20, 500, 1);
        var fault = Assert.Throws<InputException>(() => Clouds.Intake(Clouds.Survey(new MemorySource(far) { FloatCoordinates = true })));
        Assert.Contains("steps of 0.5 m", fault.Found);
        Assert.Equal(500, Clouds.Intake(Clouds.Survey(new MemorySource(near) { FloatCoordinates = true })).Record.Points);
        Assert.Equal(500, Clouds.Intake(Clouds.Survey(new MemorySource(far))).Record.Points);
    }

    [Fact]
    public void Points_that_are_no_numbers_or_far_away_are_dropped_and_counted()
    {
        var places = new List<Vec3>(Clouds.Patch(Utm, new Vec3(0.2, 0, 1), 40, 30, 20_000, 3));
        for (int i = 0; i < 7; i++) places.Insert(i * 900, new Vec3(double.NaN, 1, 2));
        places.Insert(5000, new Vec3(Utm.X, double.PositiveInfinity, 0));
        for (int i = 0; i < 11; i++) places.Insert(i * 500, Utm + new Vec3(3000 + (40 * i), -2500, 700));
        for (int i = 0; i < 20; i++) places.Insert(i * 700, new Vec3(0, 0, 0));
        var remarks = new List<Remark>();
        IPieces pieces = Clouds.Intake(Clouds.Survey(new MemorySource([.. places])), remarks);
        Assert.Equal(8, pieces.Record.Tiles[0].NotANumber);
        Assert.Equal(31, pieces.Record.Tiles[0].FarOutliers);
        Assert.Equal(20_000, pieces.Record.Points);
        Assert.Equal(20_000, Clouds.All(pieces).Count);
        Assert.Contains(remarks, r => r.Text.StartsWith("8 points", StringComparison.Ordinal));
        Assert.Contains(remarks, r => r.Text.StartsWith("31 points", StringComparison.Ordinal));
    }

    [Fact]
    public void A_distant_but_dense_second_outcrop_is_not_taken_for_garbage()
    {
        Vec3[] places = [.. Clouds.Patch(Utm, new Vec3(0, 0, 1), 20, 20, 30_000, 3), .. Clouds.Patch(Utm + new Vec3(500, 100, 30), new Vec3(1, 0, 1), 6, 6, 900, 4)];
        Assert.Equal(30_900, Clouds.Intake(Clouds.Survey(new MemorySource(places))).Record.Points);
    }

    [Fact]
    public void A_cliff_below_a_flat_bench_is_kept_however_few_its_points()
    {
        Vec3[] places = [.. Clouds.Patch(Utm, new Vec3(0, 0, 1), 50, 50, 30_000, 3), .. Clouds.Patch(Utm + new Vec3(25, 0, -25), new Vec3(1, 0, 0), 50, 50, 40, 4)];
        Assert.Equal(30_040, Clouds.Intake(Clouds.Survey(new MemorySource(places))).Record.Points);
    }

    // 1 international foot = 0.3048 m exactly, 1 US survey foot = 1200/3937 m: their definitions.
    [Theory]
    [InlineData(0.3048, "international feet")]
    [InlineData(1200.0 / 3937, "US survey feet")]
    public void Feet_become_metres_across_and_up(double foot, string said)
    {
        Vec3[] places = [.. Clouds.Patch(Utm, new Vec3(0, 0.5, 1), 10, 10, 900, 3).Select(p => p / foot)];
        var crs = Projected with { HorizontalUnitM = foot, VerticalUnitM = foot };
        var remarks = new List<Remark>();
        IPieces pieces = Clouds.Intake(Clouds.Survey(new MemorySource(places) { Crs = crs }), remarks);
        Vec3 back = pieces.Record.Frame.ToMap(Clouds.All(pieces)[17]);
        Assert.True((back - (places[17] * foot)).Length < 1e-5);
        Assert.Contains(remarks, r => r.Text.Contains(said, StringComparison.Ordinal));
    }

    [Fact]
    public void Feet_up_and_metres_across_go_by_their_own_units()
    {
        var crs = Projected with { VerticalUnitM = 0.3048 };
        IPieces pieces = Clouds.Intake(Clouds.Survey(new MemorySource([.. Clouds.Patch(new Vec3(), new Vec3(0, 0, 1), 9, 9, 50, 2), new Vec3(1, 2, 10)]) { Crs = crs }));
        Vec3 last = pieces.Record.Frame.ToMap(Clouds.All(pieces)[^1]);
        Assert.Equal(1, last.X, 1e-6);
        Assert.Equal(3.048, last.Z, 1e-6);
    }

    [Theory]
    [InlineData("x y z", 1.0, 2.0, 3.0, false)]
    [InlineData("x -z y", 1.0, -3.0, 2.0, false)]
    [InlineData("Y X Z", 2.0, 1.0, 3.0, true)]
    public void Axes_are_reordered_and_a_mirror_is_remarked(string axes, double x, double y, double z, bool mirror)
    {
        var remarks = new List<Remark>();
        IPieces pieces = Clouds.Intake(Clouds.Survey(new MemorySource([new Vec3(1, 2, 3)])) with { Axes = axes, OffsetM = new Vec3(10, 20, 30) }, remarks);
        Assert.Equal(new Vec3(x + 10, y + 20, z + 30), pieces.Record.Frame.ToMap(Clouds.All(pieces)[0]));
        Assert.Equal(mirror, remarks.Any(r => r.Text.Contains("mirror", StringComparison.Ordinal)));
    }

    [Theory]
    [InlineData("x y")]
    [InlineData("x y y")]
    [InlineData("x y up")]
    public void Axes_that_are_none_are_refused(string axes) =>
        Assert.Throws<InputException>(() => Clouds.Intake(Clouds.Survey(new MemorySource([new Vec3(1, 2, 3)])) with { Axes = axes }));

    // LAS 1.4 R16 wants 8-bit colour times 256 (white is 65280); files with 0-255 are common practice.
    [Theory]
    [InlineData(255, 0)]
    [InlineData(65280, 8)]
    [InlineData(65535, 8)]
    public void White_is_white_whatever_bits_it_was_stored_with(int white, int shift)
    {
        Vec3[] places = Clouds.Patch(new Vec3(), new Vec3(0, 0, 1), 5, 5, 300, 2);
        (ushort, ushort, ushort)[] colours = Clouds.Grey(300, (ushort)(white / 2));
        colours[7] = ((ushort)white, (ushort)white, (ushort)white);
        IPieces pieces = Clouds.Intake(Clouds.Survey(new MemorySource(places, colours)));
        Assert.True(pieces.Record.HasColour);
        Assert.Equal(shift, pieces.Record.Tiles[0].ColourShift);
        using PointBlock block = pieces.Read(CancellationToken.None).First();
        Assert.Equal(255, block.Green[7]);
        Assert.Equal(127, block.Blue[8]);
    }

    [Fact]
    public void Colour_in_some_files_only_is_left_aside_and_said()
    {
        var remarks = new List<Remark>();
        IPieces pieces = Clouds.Intake(
            Clouds.Survey(
                new MemorySource(Clouds.Patch(new Vec3(), new Vec3(0, 0, 1), 5, 5, 300, 2), Clouds.Grey(300, 90)) { Name = "a.las" },
                new MemorySource(Clouds.Patch(new Vec3(6, 0, 0), new Vec3(0, 0, 1), 5, 5, 300, 3)) { Name = "b.las" }),
            remarks);
        Assert.False(pieces.Record.HasColour);
        Assert.Contains(remarks, r => r.Doubtful && r.Text.Contains("b.las", StringComparison.Ordinal));
    }

    [Fact]
    public void Doubled_points_are_kept_once_in_one_file_and_across_files()
    {
        Vec3[] a = Clouds.Patch(Utm, new Vec3(0, 0, 1), 10, 10, 4000, 2), b = Clouds.Patch(Utm + new Vec3(30, 0, 0), new Vec3(0, 0, 1), 10, 10, 4000, 3);
        Vec3[] first = [.. a, .. a.Take(250)], second = [.. b, .. a.Skip(1000).Take(400), .. b.Take(1)];
        IPieces pieces = Clouds.Intake(Clouds.Survey(new MemorySource(first) { Name = "a.las" }, new MemorySource(second) { Name = "b.las" }));
        Assert.Equal(250, pieces.Record.Tiles[0].Doubled);
        Assert.Equal(401, pieces.Record.Tiles[1].Doubled);
        Assert.Equal(8000, pieces.Record.Points);
        List<Vec3> all = Clouds.All(pieces);
        Assert.Equal(8000, all.Count);
        Assert.Equal(8000, all.Distinct().Count());
    }

    [Fact]
    public void A_file_that_repeats_another_in_another_order_is_left_out()
    {
        Vec3[] a = Clouds.Patch(Utm, new Vec3(0, 0, 1), 10, 10, 3000, 2);
        var remarks = new List<Remark>();
        IPieces pieces = Clouds.Intake(Clouds.Survey(new MemorySource(a) { Name = "a.las" }, new MemorySource([.. a.Reverse()]) { Name = "copy of a.las" }), remarks);
        Assert.True(pieces.Record.Tiles[1].IsCopy);
        Assert.Equal(3000, pieces.Record.Points);
        Assert.Empty(pieces.Record.DoubledKeys);
        Assert.Contains(remarks, r => r.Text.Contains("copy of a.las", StringComparison.Ordinal));
    }

    [Fact]
    public void Degrees_conflicts_and_empty_clouds_are_refused_with_what_to_do()
    {
        Vec3[] a = Clouds.Patch(Utm, new Vec3(0, 0, 1), 10, 10, 100, 2);
        var degrees = new CrsInfo { Kind = CrsKind.Geographic, Name = "WGS 84", Epsg = 4326 };
        Assert.Contains("eproject", Assert.Throws<InputException>(() => Clouds.Intake(Clouds.Survey(new MemorySource(a) { Crs = degrees }))).Mend);
        var other = Assert.Throws<InputException>(() => Clouds.Intake(Clouds.Survey(
            new MemorySource(a) { Crs = Projected, Name = "a.las" }, new MemorySource(a) { Crs = Projected with { Epsg = 32633 }, Name = "b.las" })));
        Assert.Equal("b.las", other.Where);
        Assert.Contains("no points", Assert.Throws<InputException>(() => Clouds.Intake(Clouds.Survey(new MemorySource([])))).What);
        Assert.Throws<InputException>(() => Clouds.Intake(Clouds.Survey()));
        Assert.Throws<InputException>(() => Clouds.Intake(Clouds.Survey(new MemorySource([new Vec3(double.NaN, 0, 0)]))));
        Vec3[] wide = [.. a, .. Clouds.Patch(Utm + new Vec3(40_000, 0, 0), new Vec3(0, 0, 1), 10, 10, 100, 2)];
        Assert.Contains("too wide", Assert.Throws<InputException>(() => Clouds.Intake(Clouds.Survey(new MemorySource(wide)))).What);
    }

    [Fact]
    public void North_is_true_when_the_convergence_is_known_else_grid_and_said_and_model_without_reference()
    {
        SurveyInput survey = Clouds.Survey(new MemorySource(Clouds.Patch(Utm, new Vec3(0, 0, 1), 10, 10, 100, 2)) { Crs = Projected });
        SurveyFrame known = Clouds.Intake(survey with { Convergence = (x, y) => x > 432_000 && y > 6_651_000 ? -1.05 : null }).Record.Frame;
        Assert.Equal((North.True, -1.05), (known.North, known.TurnDeg));
        var remarks = new List<Remark>();
        Assert.Equal(North.Grid, Clouds.Intake(survey, remarks).Record.Frame.North);
        Assert.Contains(remarks, r => r.Doubtful && r.Text.Contains("grid north", StringComparison.Ordinal));
        SurveyFrame model = Clouds.Intake(survey with { Convergence = (_, _) => 1, Reference = new ModelReference { Kind = ReferenceKind.None } }).Record.Frame;
        Assert.Equal((North.Model, 0.0), (model.North, model.TurnDeg));
    }

    [Fact]
    public void Spacing_is_the_root_of_the_surface_per_point_for_small_and_for_sampled_clouds()
    {
        foreach (int count in new[] { 4000, 400_000 })
        {
            IPieces pieces = Clouds.Intake(Clouds.Survey(new MemorySource(Clouds.Patch(Utm, new Vec3(0.5, 0.2, 1), 30, 20, count, 6, 0.002))));
            double expected = Math.Sqrt(600.0 / count);
            Assert.InRange(pieces.Record.InputSpacingM, 0.93 * expected, 1.07 * expected);
        }
    }

    [Fact]
    public void A_record_revives_the_same_stream()
    {
        Vec3[] places = [.. Clouds.Patch(Utm, new Vec3(0, 0, 1), 10, 10, 4000, 2), Utm + new Vec3(9000, 0, 0)];
        SurveyInput survey = Clouds.Survey(new MemorySource(places));
        IPieces pieces = Clouds.Intake(survey);
        Assert.Equal(Clouds.All(pieces), Clouds.All(new Pieces(survey, pieces.Record)));
    }
}
