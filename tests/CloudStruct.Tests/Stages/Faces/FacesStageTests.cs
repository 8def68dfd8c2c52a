using CloudStruct.Maths.Directions;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Stages.Faces;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Stages.Faces;

public class FacesStageTests
{
    [Fact]
    public void A_corner_of_three_faces_comes_back_with_attitude_size_and_outline()
    {
        var low = new Attitude(20, 10);
        var steep = new Attitude(110, 80);
        var wall = new Attitude(200, 88);
        FaceSet found = Run(new PatchCloud()
            .Add(new Vec3(0, 0, 0), low, 2, 1.5, 0.003)
            .Add(new Vec3(0, 3, 0), steep, 1.6, 1.0, 0.003)
            .Add(new Vec3(4.01, 0, 0), wall, 1.2, 0.7, 0.003)
            .Describe());

        Assert.Equal(3, found.Faces.Length);
        Check(found.Faces[0], low, 2, 1.5);
        Check(found.Faces[1], steep, 1.6, 1.0);
        Check(found.Faces[2], wall, 1.2, 0.7);
        for (int f = 0; f < found.Faces.Length; f++) Assert.Equal(found.Faces[f].Points, found.FaceOfPoint.Count(k => k == f + 1));
    }

    [Fact]
    public void Faces_that_meet_at_an_edge_are_told_apart_on_both_sides_of_it()
    {
        // A ridge: two planes dipping 30 deg away from a level crest along north.
        FaceSet found = Run(new PatchCloud()
            .Add(new Vec3(0.5 * Math.Cos(Math.PI / 6), 0, -0.5 * Math.Sin(Math.PI / 6)), new Attitude(0, 30), 2, 1, 0.003)
            .Add(new Vec3(-0.5 * Math.Cos(Math.PI / 6), 0, -0.5 * Math.Sin(Math.PI / 6)), new Attitude(180, 30), 2, 1, 0.003)
            .Describe());

        Assert.Equal(2, found.Faces.Length);
        Assert.All(found.Faces, f => Assert.InRange(f.Attitude.DipDeg, 29, 31));
        Assert.All(found.Faces, f => Assert.InRange(f.AreaM2, 1.85, 2.15));
    }

    [Theory]
    [InlineData(0.05, 1)]   // within the automatic gap of five spacings
    [InlineData(0.60, 2)]
    public void A_gap_in_a_plane_parts_it_only_when_wide(double gapM, int faces)
    {
        FaceSet found = Run(new PatchCloud()
            .Add(default, new Attitude(70, 60), 3, 1, 0.002, keep: (u, _) => Math.Abs(u) > gapM / 2).Describe());
        Assert.Equal(faces, found.Faces.Length);
    }

    [Theory]
    [InlineData(5)]
    [InlineData(7)]
    public void Two_planes_that_meet_at_a_blunt_fold_are_two_faces_each_with_its_own_attitude(double foldDeg)
    {
        double half = foldDeg / 2 * Math.PI / 180;
        FaceSet found = Run(new PatchCloud()
            .Add(new Vec3(0.6 * Math.Cos(half), 0, -0.6 * Math.Sin(half)), new Attitude(0, foldDeg / 2), 2, 1.2, 0.003)
            .Add(new Vec3(-0.6 * Math.Cos(half), 0, -0.6 * Math.Sin(half)), new Attitude(180, foldDeg / 2), 2, 1.2, 0.003)
            .Describe());
        Assert.Equal(2, found.Faces.Length);
        Assert.All(found.Faces, f => Assert.Equal(foldDeg / 2, f.Attitude.DipDeg, 0.5));
        Assert.Equal(180, Math.Abs(found.Faces[0].Attitude.StrikeDeg - found.Faces[1].Attitude.StrikeDeg), 25.0);
    }

    [Fact]
    public void An_undulating_plane_stays_one_face()
    {
        FaceSet found = Run(new PatchCloud().Add(default, new Attitude(30, 60), 3, 2, 0.005, 1.5).Describe());
        Assert.Single(found.Faces);
    }

    [Fact]
    public void Parallel_faces_a_step_apart_stay_two()
    {
        var a = new Attitude(0, 0);
        FaceSet found = Run(new PatchCloud().Add(default, a, 1.5, 1, 0.002).Add(new Vec3(0, 1.55, 0.04), a, 1.5, 1, 0.002).Describe());
        Assert.Equal(2, found.Faces.Length);
    }

    [Fact]
    public void Bumpy_ground_beside_planes_is_refused_and_said()
    {
        var said = new List<Remark>();
        DescribedCloud cloud = new PatchCloud()
            .Add(default, new Attitude(20, 70), 2, 1.5, 0.004)
            .Add(new Vec3(0, 4, 0), new Attitude(110, 80), 2, 1.5, 0.004)
            .Add(new Vec3(5, 0, 0), new Attitude(0, 8), 1.5, 1.5, 0.018, 0.35)
            .Describe();
        FaceSet found = new FacesStage().Run(cloud, new FaceSettings(), StageContext.Plain(say: said.Add));
        Assert.DoesNotContain(found.Faces, f => f.Attitude.DipDeg < 40);
        Assert.Equal(2, found.Faces.Count(f => f.AreaM2 > 2.5));
    }

    [Fact]
    public void A_worn_bench_in_one_plane_with_a_sound_face_is_left_out_of_it()
    {
        FaceSet found = Run(new PatchCloud()
            .Add(default, new Attitude(90, 30), 1.5, 1.5, 0.004)
            .Add(new Vec3(1.5, 0, 0), new Attitude(90, 30), 1.5, 1.5, 0.014, 0.3)
            .Add(new Vec3(0, 5, 0), new Attitude(110, 80), 2, 1.5, 0.004)
            .Add(new Vec3(5, 5, 0), new Attitude(20, 80), 2, 1.5, 0.004)
            .Describe());
        Face sound = found.Faces.Where(f => f.Attitude.DipDeg < 45).MaxBy(f => f.AreaM2)!;
        Assert.InRange(sound.AreaM2, 1.9, 2.7);
        Assert.InRange(sound.Middle.X, -0.2, 0.25);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(3)]
    [InlineData(200)]
    public void A_few_points_or_a_line_of_points_hold_no_face(int count)
    {
        var said = new List<Remark>();
        DescribedCloud cloud = new PatchCloud().Add(Enumerable.Range(0, count).Select(i => new Vec3(0.02 * i, 0.01 * i, 0.005 * i))).Describe();
        FaceSet found = new FacesStage().Run(cloud, new FaceSettings(), StageContext.Plain(say: said.Add));
        Assert.Empty(found.Faces);
        Assert.Equal(cloud.Cloud.Count, found.FaceOfPoint.Length);
        Assert.Contains(said, r => r.Doubtful);
    }

    // A face that strikes north, with a wall square to it at none, one or both of its ends.
    [Theory]
    [InlineData(0, 2)]
    [InlineData(1, 1)]
    [InlineData(2, 0)]
    public void Ends_along_strike_at_which_nothing_goes_on_are_hidden(int walls, int hidden)
    {
        var cloud = new PatchCloud().Add(default, new Attitude(0, 60), 1.5, 1, 0.003);
        for (int k = 0; k < walls; k++) cloud.Add(new Vec3(0, k == 0 ? 0.76 : -0.76, 0), new Attitude(90, 90), 1.8, 1.8, 0.003);
        Face face = Run(cloud.Describe()).Faces.Single(f => f.Attitude.DipDeg < 75);
        Assert.Equal(hidden, face.EndsHidden);
    }

    [Fact]
    public void True_north_turns_the_strike_and_nothing_else()
    {
        DescribedCloud cloud = new PatchCloud().Add(default, new Attitude(40, 70), 1.5, 1, 0.002).Describe();
        DescribedCloud turned = cloud with
        {
            Cloud = cloud.Cloud with { Frame = new SurveyFrame { North = North.True, ConvergenceDeg = 1.5 } },
        };
        Face grid = Run(cloud).Faces.Single(), northern = Run(turned).Faces.Single();
        Assert.Equal(1.5, northern.Attitude.StrikeDeg - grid.Attitude.StrikeDeg, 1e-9);
        Assert.Equal(grid.Normal, northern.Normal);
    }

    [Fact]
    public void Common_errors_widen_the_total_cone_only()
    {
        DescribedCloud cloud = new PatchCloud().Add(default, new Attitude(40, 70), 1.5, 1, 0.002).Describe();
        DescribedCloud tied = cloud with
        {
            Cloud = cloud.Cloud with { Frame = new SurveyFrame { Reference = new ModelReference { TiltSigmaDeg = 0.5, AzimuthSigmaDeg = 1 } } },
        };
        PoleRegion loose = Run(cloud).Faces.Single().Region, total = Run(tied).Faces.Single().Region;
        Assert.Equal(loose.Cone95Deg, total.Cone95Deg);
        Assert.InRange(total.Cone95TotalDeg, 1.94, 2.1);   // 0.955 deg across, 0.5 deg down: 2.04 x 0.955, and the little of the patch itself
    }

    [Fact]
    public void Wrong_settings_are_all_named()
    {
        var wrong = new FaceSettings { SmallestFaceM2 = double.NaN, ToleranceM = 0, BendDeg = 60, GapM = -1 };
        Assert.Equal(
            ["faces.smallest_face_m2", "faces.tolerance_m", "faces.bend_deg", "faces.gap_m"],
            wrong.Check().Select(c => c.Key));
        Assert.Empty(new FaceSettings().Check());
    }

    [Fact]
    public void A_cancelled_run_stops()
    {
        DescribedCloud cloud = new PatchCloud().Add(default, new Attitude(40, 70), 1.5, 1).Describe();
        using var stop = new CancellationTokenSource();
        stop.Cancel();
        Assert.ThrowsAny<OperationCanceledException>(
            () => new FacesStage().Run(cloud, new FaceSettings(), StageContext.Plain() with { Stop = stop.Token }));
    }

    private static FaceSet Run(DescribedCloud cloud) => new FacesStage().Run(cloud, new FaceSettings(), StageContext.Plain());

    private static void Check(Face f, Attitude truth, double lengthM, double heightM)
    {
        Vec3 n = truth.UpwardNormal();
        Assert.InRange(Math.Acos(Math.Min(1, Math.Abs(f.Normal.Dot(n)))) * 180 / Math.PI, 0, 0.5);

        // The waves of the smallest happen to be the highest: 7 % of its points lie beyond the band of the scene, in strips along its sides.
        Assert.Equal(lengthM * heightM, f.AreaM2, (lengthM * heightM > 1 ? 0.04 : 0.08) * lengthM * heightM);
        Assert.Equal(lengthM, f.LengthM, 0.06);
        Assert.Equal(heightM, f.HeightM, 0.06);
        Assert.Equal(f.Outline[0], f.Outline[^1]);
        Assert.All(f.Outline, p => Assert.Equal(0, f.Normal.Dot(p - f.Middle), 0.01));

        // Counter-clockwise seen against the normal: twice the area along the normal is positive, and of the right size.
        Vec3 twice = default;
        for (int i = 0; i + 1 < f.Outline.Length; i++) twice += (f.Outline[i] - f.Middle).Cross(f.Outline[i + 1] - f.Middle);
        Assert.InRange(twice.Dot(f.Normal) / 2, 0.93 * f.AreaM2, 1.15 * f.AreaM2);
        Assert.True(f.Normal.Z > 0);
        Assert.InRange(f.Region.Cone95Deg, 0.01, 2);
        (Vec3 along, _) = PoleRegions.StrikeAndDip(f.Normal);
        Assert.Equal(0, along.Z);
    }
}
