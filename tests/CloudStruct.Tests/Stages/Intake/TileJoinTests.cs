using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Stages.Intake;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Stages.Intake;

public class TileJoinTests
{
    [Fact]
    public void A_height_offset_between_overlapping_tiles_is_measured_said_and_removed()
    {
        Vec3[] west = Ground(0, 24, 1, 0), east = Ground(16, 40, 2, 0.037);
        var remarks = new List<Remark>();
        IPieces pieces = Clouds.Intake(Clouds.Survey(new MemorySource(west) { Name = "west.las" }, new MemorySource(east) { Name = "east.las" }), remarks);
        TileFix[] fix = pieces.Record.Tiles;
        Assert.Equal(-0.037, fix[1].ShiftZM - fix[0].ShiftZM, 0.002);
        Assert.Equal(0, fix[0].ShiftZM + fix[1].ShiftZM, 1e-9);
        Assert.Contains(remarks, r => r.Text.Contains("east.las shows the ground 0.03", StringComparison.Ordinal) && r.Text.Contains("higher", StringComparison.Ordinal));

        // Afterwards every point lies on the one ground, shifted by half the offset, whichever file it came from.
        Vec3 origin = pieces.Record.Frame.Origin;
        double[] off = [.. Clouds.All(pieces).Select(p => p + origin).Select(p => p.Z - HeightAt(p.X, p.Y))];
        Assert.Equal(0.0185, off.Average(), 0.002);
        Assert.True(Math.Sqrt(off.Average(d => (d - off.Average()) * (d - off.Average()))) < 0.006);
    }

    [Fact]
    public void The_overlap_keeps_its_density_and_every_column_one_owner()
    {
        Vec3[] west = Ground(0, 24, 1, 0), east = Ground(16, 40, 2, 0);
        IPieces pieces = Clouds.Intake(Clouds.Survey(new MemorySource(west), new MemorySource(east)));
        Vec3 origin = pieces.Record.Frame.Origin;
        List<Vec3> all = Clouds.All(pieces);
        int Density(double x0, double x1) => all.Count(p => p.X + origin.X >= x0 && p.X + origin.X < x1);
        Assert.InRange(Density(18, 22) / (double)Density(4, 8), 0.9, 1.1);
        Assert.True(pieces.Record.Tiles.Sum(t => t.Overlapped) > 0.3 * Density(16, 24));
        Assert.Equal(pieces.Record.Points, all.Count);

        var off = Clouds.Intake(Clouds.Survey(new MemorySource(west), new MemorySource(east)), settings: new IntakeSettings { JoinTiles = false });
        Assert.Equal(west.Length + east.Length, off.Record.Points);
    }

    [Fact]
    public void Tiles_that_fit_are_left_at_their_heights_without_a_word()
    {
        var remarks = new List<Remark>();
        IPieces pieces = Clouds.Intake(Clouds.Survey(new MemorySource(Ground(0, 24, 1, 0)), new MemorySource(Ground(16, 40, 2, 0))), remarks);
        Assert.All(pieces.Record.Tiles, t => Assert.Equal(0, t.ShiftZM));
        Assert.DoesNotContain(remarks, r => r.Text.Contains("offset", StringComparison.Ordinal));
    }

    [Fact]
    public void The_same_points_in_the_rim_of_two_tiles_are_doubled_not_overlapped_and_none_is_lost()
    {
        Vec3[] all = Ground(0, 40, 1, 0);
        Vec3[] west = [.. all.Where(p => p.X < 24)], east = [.. all.Where(p => p.X >= 16)];
        IPieces pieces = Clouds.Intake(Clouds.Survey(new MemorySource(west), new MemorySource(east)));
        Assert.Equal(all.Count(p => p.X >= 16 && p.X < 24), pieces.Record.Tiles[1].Doubled);
        Assert.Equal(0, pieces.Record.Tiles.Sum(t => t.Overlapped));
        Assert.Equal(all.Length, pieces.Record.Points);
    }

    [Fact]
    public void Shifts_of_a_ring_of_tiles_share_out_what_does_not_close()
    {
        // By hand: offsets 1, 1 and -1.7 around three files do not close by 0.3; each takes 0.1 of it.
        List<TileOffset> ring = [new(0, 1, 1, 0.01, 99), new(1, 2, 1, 0.01, 99), new(0, 2, 1.7, 0.01, 99)];
        double[] shift = TileShifts.Of(ring, 4);
        Assert.Equal(0, shift.Sum(), 1e-6);
        Assert.Equal(-0.9, shift[1] - shift[0], 1e-5);
        Assert.Equal(-0.9, shift[2] - shift[1], 1e-5);
        Assert.Equal(0, shift[3]);
    }

    [Fact]
    public void Order_of_reading_and_threads_do_not_change_the_record()
    {
        SurveyInput survey = Clouds.Survey(new MemorySource(Ground(0, 24, 1, 0)), new MemorySource(Ground(16, 40, 2, 0.02)));
        IntakeRecord one = Clouds.Intake(survey, threads: 1).Record, four = Clouds.Intake(survey, threads: 4).Record;
        Assert.Equal(one.Tiles, four.Tiles);
        Assert.Equal(one.OwnerKeys, four.OwnerKeys);
        Assert.Equal(one.OwnerTiles, four.OwnerTiles);
        Assert.Equal(one.InputSpacingM, four.InputSpacingM);
    }

    private static double HeightAt(double x, double y) => (0.2 * x) + (0.4 * Math.Sin(x / 5) * Math.Cos(y / 4));

    // Uneven ground from x0 to x1, 10 m wide, about 100 points per square metre, 5 mm of noise, raised by an offset.
    private static Vec3[] Ground(double x0, double x1, ulong seed, double raisedM)
    {
        int count = (int)((x1 - x0) * 10 * 100);
        var places = new Vec3[count];
        for (int i = 0; i < count; i++)
        {
            var draws = new Draws(seed, 5, (ulong)i);
            double x = x0 + (draws.NextUnit() * (x1 - x0)), y = draws.NextUnit() * 10;
            places[i] = new Vec3(x, y, HeightAt(x, y) + raisedM + (0.005 * draws.NextNormal()));
        }

        return places;
    }
}
