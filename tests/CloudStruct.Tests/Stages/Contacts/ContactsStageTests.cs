using System.Text.Json;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Field;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Width;

namespace CloudStruct.Tests.Stages.Contacts;

// The truth of these scenes is their construction: a plane of given strike, dip and width across ground of a given height.
public class ContactsStageTests
{
    private static double Angle(Vec3 a, Vec3 b) => Math.Acos(Math.Min(1, Math.Abs(a.Dot(b)))) * 180 / Math.PI;

    [Theory]
    [InlineData(0, 90)]
    [InlineData(30, 70)]
    [InlineData(135, 55)]
    [InlineData(251, 85)]
    [InlineData(318, 40)]
    public void Contacts_and_widths_of_a_planar_dike_are_found_at_any_strike_and_dip(double strike, double dip)
    {
        var scene = new DikeScene { StrikeDeg = strike, DipDeg = dip };
        (ContactsRecord contacts, WidthRecord width, _) = DikeScene.Measure(scene.Make());
        Contact[] planes = [.. contacts.Contacts.Where(c => c.Constraint == Constraint.Plane)];
        Assert.NotEmpty(planes);
        Assert.All(planes, c => Assert.True(Angle(c.Normal!.Value, scene.Normal) < 1, $"{Angle(c.Normal!.Value, scene.Normal)}"));
        Station[] measured = [.. width.Stations.Where(s => s.Status == StationStatus.Measured)];
        Assert.True(measured.Length >= 10);
        // The cells at the cloud's edge are cut: the end stations only have to know how uncertain they are.
        Assert.All(measured[1..^1], s => Assert.Equal(2, s.TrueWidthM!.Value, 0.04));
        Assert.All(measured, s => Assert.InRange(2, s.TrueWidthLow95M!.Value, s.TrueWidthHigh95M!.Value));
        Assert.All(measured, s => Assert.True(s.ExposedWidthM >= s.TrueWidthM - 1e-9));
        Assert.Equal(2, width.Dikes[0].WidthMeanM!.Value, 0.02);
    }

    [Fact]
    public void Margin_A_lies_on_the_left_of_increasing_chainage_and_the_lean_has_the_sign_of_the_top()
    {
        // Strike 30, dip 70 toward 120: chainage runs toward 30, B on the right, the top leans back to the left, to A.
        (ContactsRecord contacts, _, _) = DikeScene.Measure(new DikeScene { StrikeDeg = 30, DipDeg = 70 }.Make());
        Contact a = contacts.Contacts.First(c => c.Margin == Margin.A && c.Constraint == Constraint.Plane);
        Assert.Equal(-20, a.LeanToBDeg!.Value, 1.0);
        Assert.True(a.LeanLow95Deg < a.LeanToBDeg && a.LeanToBDeg < a.LeanHigh95Deg);
        Assert.Equal(30, a.TrendAlongDeg!.Value, 1.0);
        Assert.Equal("NW", a.MarginFacing);
        Vec3 run = contacts.Dikes[0].CentreLine[^1] - contacts.Dikes[0].CentreLine[0];
        Assert.InRange(Azimuth.Of(run), 0, 180);
        Vec3 toB = contacts.Traces.First(t => t.Margin == Margin.B).Points[0] - contacts.Traces.First(t => t.Margin == Margin.A).Points[0];
        Assert.True(toB.Dot(run.Cross(Vec3.Up)) > 0);
    }

    [Fact]
    public void Level_ground_gives_lines_and_unconstrained_stations_with_an_apparent_width_only()
    {
        (ContactsRecord contacts, WidthRecord width, _) = DikeScene.Measure(new DikeScene { Steps = false, DipDeg = 60 }.Make());
        Assert.NotEmpty(contacts.Contacts);
        Assert.All(contacts.Contacts, c => Assert.Equal(Constraint.Line, c.Constraint));
        Assert.All(contacts.Contacts, c => Assert.Null(c.Attitude));
        Assert.DoesNotContain(width.Stations, s => s.Status == StationStatus.Measured);
        Station[] seen = [.. width.Stations.Where(s => s.Status == StationStatus.Unconstrained)];
        Assert.True(seen.Length >= 10);
        // Horizontal width of a sheet of 2 m dipping 60 deg: 2 / sin 60.
        Assert.All(seen, s => Assert.Equal(2 / Math.Sin(Math.PI / 3), s.ApparentWidthM!.Value, 0.06));
        Assert.All(seen, s => Assert.Null(s.TrueWidthM));
        Assert.Null(width.Dikes[0].WidthMeanM);
    }

    [Fact]
    public void A_compass_reading_gives_level_ground_its_dip_in_rows_of_their_own()
    {
        var scene = new DikeScene { Steps = false, DipDeg = 60 };
        FieldReading Reading(ReadingUse use, double east) => new("r1", new Vec3(east, 0, double.NaN), 0.1, ReadingKind.Contact, new Attitude(33, 57), false, use);
        (ContactsRecord contacts, _, List<Records.Stages.Remark> said) = DikeScene.Measure(scene.Make(), readings: [Reading(ReadingUse.Prior, 0.5)]);
        Contact[] informed = [.. contacts.Contacts.Where(c => c.Evidence == Evidence.Prior)];
        Assert.NotEmpty(informed);
        Assert.All(informed, c => Assert.Equal(Constraint.Plane, c.Constraint));
        Assert.All(informed, c => Assert.InRange(Angle(c.Normal!.Value, scene.Normal), 0, c.Region!.Cone95Deg));
        Assert.All(informed, c => Assert.Equal(30, c.Attitude!.Value.StrikeDeg, 1.5));   // strike is the trace's, not the reading's
        Assert.All(contacts.Contacts.Except(informed), c => Assert.Equal(Constraint.Line, c.Constraint));
        Assert.Contains(said, r => r.Text.Contains("r1"));
        Assert.Contains(said, r => r.Doubtful && r.Text.Contains("would mend that"));
        foreach (FieldReading other in (FieldReading[])[Reading(ReadingUse.Check, 0.5), Reading(ReadingUse.Prior, 30)])
        {
            (ContactsRecord without, _, _) = DikeScene.Measure(scene.Make(), readings: [other]);
            Assert.DoesNotContain(without.Contacts, c => c.Evidence == Evidence.Prior);
        }
    }

    [Fact]
    public void A_dike_that_ends_inside_the_survey_is_not_followed_beyond_its_end_and_that_is_said()
    {
        var scene = new DikeScene { StrikeDeg = 30, DipDeg = 80, EndsAtM = 4 };
        double Along(Vec3 p) => (p.X * 0.5) + (p.Y * Math.Sqrt(0.75));
        (ContactsRecord contacts, WidthRecord width, List<Records.Stages.Remark> said) = DikeScene.Measure(scene.Make());
        Assert.All(width.Stations, s => Assert.True(Along(s.Place) < 4.6, $"{Along(s.Place)} {s.Status}"));
        Assert.All(contacts.Traces, t => Assert.True(t.Points.Max(Along) < 4.6));
        Assert.Contains(said, r => r.Text.Contains("At the end of its chainage host rock lies across"));
        Assert.DoesNotContain(said, r => r.Text.Contains("At the start"));
    }

    [Fact]
    public void A_step_of_the_width_is_found_with_place_and_size()
    {
        var scene = new DikeScene { StrikeDeg = 0, DipDeg = 80, Step = (0.7, 0.5) };
        (_, WidthRecord width, _) = DikeScene.Measure(scene.Make());
        WidthTrend step = Assert.Single(width.Trends, t => t.Kind == WidthTrendKind.Step);
        Assert.InRange(0.7, step.ChainageM.Low95 + width.Stations[0].Place.Y - width.Stations[0].ChainageM, step.ChainageM.High95 + width.Stations[0].Place.Y - width.Stations[0].ChainageM);
        Assert.Equal(0.5, step.SizeM.Value, 0.1);
        Assert.Equal(1, width.Dikes[0].Steps);
        (_, WidthRecord even, _) = DikeScene.Measure(new DikeScene { StrikeDeg = 0, DipDeg = 80 }.Make());
        Assert.DoesNotContain(even.Trends, t => t.Kind == WidthTrendKind.Step);
        Assert.Equal(0, even.Dikes[0].Steps);
        Assert.Equal(3, even.Dikes[0].Laws.Length);
    }

    [Fact]
    public void A_covered_stretch_is_never_measured()
    {
        var scene = new DikeScene { StrikeDeg = 0, DipDeg = 80, Cover = (-1.5, 1.5) };
        (ContactsRecord contacts, WidthRecord width, _) = DikeScene.Measure(scene.Make());
        Assert.NotEmpty(width.Stations);
        foreach (Station s in width.Stations)
        {
            double along = s.Place.Y;
            if (Math.Abs(along) < 1.4) Assert.Equal(StationStatus.BothHidden, s.Status);
            else if (Math.Abs(along) > 2 && Math.Abs(along) < 8) Assert.Equal(StationStatus.Measured, s.Status);
        }

        Assert.True(contacts.Traces.Count(t => t.Margin == Margin.A) >= 2);
        Assert.InRange(width.Dikes[0].HiddenLengthM, 2, 5);
    }

    [Fact]
    public void Turning_the_rock_turns_azimuths_and_leaves_dips_and_widths()
    {
        (ContactsRecord one, WidthRecord w1, _) = DikeScene.Measure(new DikeScene { StrikeDeg = 20, DipDeg = 65 }.Make());
        (ContactsRecord two, WidthRecord w2, _) = DikeScene.Measure(new DikeScene { StrikeDeg = 110, DipDeg = 65 }.Make());
        // Cells of the map grid cut the trace elsewhere after a turn: agreement is to the trace's scatter, not to rounding.
        Assert.Equal(w1.Dikes[0].WidthMeanM!.Value, w2.Dikes[0].WidthMeanM!.Value, 0.01);
        Assert.Equal(w1.Dikes[0].Mean!.Value.DipDeg, w2.Dikes[0].Mean!.Value.DipDeg, 0.3);
        Assert.Equal(Azimuth.Wrap360(w1.Dikes[0].Mean!.Value.StrikeDeg + 90), w2.Dikes[0].Mean!.Value.StrikeDeg, 0.3);
        Assert.Equal(one.Dikes.Length, two.Dikes.Length);
    }

    [Fact]
    public void Scaling_the_rock_scales_widths()
    {
        (_, WidthRecord one, _) = DikeScene.Measure(new DikeScene { DipDeg = 75 }.Make());
        (_, WidthRecord three, _) = DikeScene.Measure(new DikeScene { DipDeg = 75, Scale = 3 }.Make());
        Assert.Equal(3 * one.Dikes[0].WidthMeanM!.Value, three.Dikes[0].WidthMeanM!.Value, 0.06);
        Assert.Equal(one.Dikes[0].Mean!.Value.DipDeg, three.Dikes[0].Mean!.Value.DipDeg, 0.5);
    }

    [Fact]
    public void The_same_bytes_come_from_one_thread_and_from_three()
    {
        (DescribedCloud, ClassifiedCloud) scene = new DikeScene().Make();
        (ContactsRecord c1, WidthRecord w1, _) = DikeScene.Measure(scene, 1);
        (ContactsRecord c3, WidthRecord w3, _) = DikeScene.Measure(scene, 3);
        Assert.Equal(JsonSerializer.Serialize(c1), JsonSerializer.Serialize(c3));
        Assert.Equal(JsonSerializer.Serialize(w1), JsonSerializer.Serialize(w3));
    }

    [Fact]
    public void A_baseline_fixes_origin_and_direction_of_chainage()
    {
        (DescribedCloud, ClassifiedCloud) scene = new DikeScene { StrikeDeg = 0, DipDeg = 85 }.Make();
        Vec3[] baseline = [new(5, 100, 0), new(5, -100, 0)];   // southward: against the usual direction
        (ContactsRecord contacts, _, _) = DikeScene.Measure(scene, baseline: baseline);
        DikeFrame frame = contacts.Dikes[0];
        for (int i = 0; i < frame.ChainageM.Length; i++) Assert.Equal(100 - frame.CentreLine[i].Y, frame.ChainageM[i], 0.01);
    }

    [Fact]
    public void Without_a_dike_there_are_no_rows_but_every_face_has_its_domain()
    {
        (DescribedCloud described, ClassifiedCloud classes) = new DikeScene().Make();
        int n = described.Cloud.Count;
        byte[] kind = new byte[n];
        Array.Fill(kind, (byte)RockClass.Host);
        for (int i = n / 2; i < n; i++) kind[i] = (byte)RockClass.Loose;
        for (int i = 3 * n / 4; i < n; i++) kind[i] = (byte)RockClass.Cover;
        var faces = new FaceSet
        {
            Faces = [new Face { FaceId = 1 }, new Face { FaceId = 2 }, new Face { FaceId = 3 }],
            FaceOfPoint = [.. Enumerable.Range(0, n).Select(i => i < n / 2 ? 1 : i < 3 * n / 4 ? 2 : 3)],
        };
        (ContactsRecord contacts, WidthRecord width, _) = DikeScene.Measure(
            (described, classes with { Class = kind, DikeOfPoint = new byte[n], DikeProbability = new byte[n], Dikes = [] }), faces: faces);
        Assert.Empty(contacts.Dikes);
        Assert.Empty(contacts.Contacts);
        Assert.Empty(width.Stations);
        Assert.Empty(width.Dikes);
        Assert.Equal([FaceDomain.Host, FaceDomain.Unknown, FaceDomain.Unknown], contacts.DomainOfFace);
        Assert.Equal([InPlace.Yes, InPlace.No, InPlace.Unknown], contacts.InPlaceOfFace);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(5)]
    public void Tiny_clouds_with_a_dike_said_to_be_there_give_no_rows_and_a_remark(int points)
    {
        var cloud = new WorkingCloud
        {
            X = new float[points], Y = [.. Enumerable.Range(0, points).Select(i => i * 0.1f)], Z = new float[points], SpacingM = 0.1,
            Neighbours = [.. Enumerable.Range(0, points * WorkingCloud.K).Select(k => k % WorkingCloud.K == 0 && points > 1 ? (k / WorkingCloud.K) == 0 ? 1 : (k / WorkingCloud.K) - 1 : -1)],
        };
        byte[] kind = [.. Enumerable.Range(0, points).Select(i => (byte)(i % 2 == 0 ? RockClass.Dike : RockClass.Host))];
        var classes = new ClassifiedCloud
        {
            Class = kind, DikeProbability = new byte[points], DikeOfPoint = [.. kind.Select(k => (byte)(k == (byte)RockClass.Dike ? 1 : 0))],
            Dikes = [new DikeBody { Dike = 1, Windows = [new SlabWindow(default, new Vec3(1, 0, 0), 1, 0.5)] }],
        };
        (ContactsRecord contacts, WidthRecord width, List<Records.Stages.Remark> said) = DikeScene.Measure((new DescribedCloud { Cloud = cloud }, classes));
        Assert.Empty(contacts.Contacts);
        Assert.Empty(width.Stations);
        Assert.Contains(said, r => r.Doubtful && r.Text.Contains("could not be followed"));
    }
}
