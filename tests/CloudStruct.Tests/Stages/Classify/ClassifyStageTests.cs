using CloudStruct.Records.Classes;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Stages.Classify;

namespace CloudStruct.Tests.Stages.Classify;

public sealed class ClassifyStageTests
{
    // Any strike, steep or slanting, darker or lighter than its host. Each margin may lie one patch (15 cm here) aside in
    // places: half of that on both sides of 2 m leaves 0.93.
    [Theory]
    [InlineData(1, 20, 85, true)]
    [InlineData(2, 100, 60, false)]
    [InlineData(3, 155, 75, true)]
    public void A_painted_dike_is_found_with_its_outline_width_and_attitude(int seed, double azimuthDeg, double dipDeg, bool darker)
    {
        var ground = new PaintedGround((ulong)seed, azimuthDeg, dipDeg, widthM: 2, darker);
        (DescribedCloud described, bool[] truth) = ground.Describe();
        ClassifiedCloud classes = Run(described);
        DikeBody dike = Assert.Single(classes.Dikes);
        Assert.True(dike.ByColour);
        Assert.InRange(PaintedGround.Iou(classes, truth), 0.93, 1);
        double[] widths = [.. dike.Windows.Select(w => w.WidthM).Order()];
        Assert.Equal(2, widths[widths.Length / 2], 0.15);
        foreach (SlabWindow w in dike.Windows) Assert.InRange(Math.Abs(w.Normal.Dot(ground.Normal)), Math.Cos(12 * Math.PI / 180), 1);
    }

    // DESIGN section 2: looking along increasing chainage, toward azimuths 0 to 180, A is on the left.
    [Theory]
    [InlineData(20)]
    [InlineData(160)]
    public void Normals_point_from_A_on_the_left_to_B_and_windows_follow_chainage(double azimuthDeg)
    {
        (DescribedCloud described, _) = new PaintedGround(4, azimuthDeg, 85, widthM: 2).Describe();
        DikeBody dike = Assert.Single(Run(described).Dikes);
        double a = azimuthDeg * Math.PI / 180;
        Vec3 along = new(Math.Sin(a), Math.Cos(a), 0), right = new(Math.Cos(a), -Math.Sin(a), 0);
        foreach (SlabWindow w in dike.Windows) Assert.True(w.Normal.Dot(right) > 0.8);
        for (int k = 1; k < dike.Windows.Length; k++) Assert.True((dike.Windows[k].Middle - dike.Windows[k - 1].Middle).Dot(along) > 0);
    }

    [Theory]
    [InlineData(true)]
    [InlineData(false)]
    public void One_rock_gives_no_dike_and_says_how_thin_one_would_have_been_missed(bool coloured)
    {
        (DescribedCloud described, _) = new PaintedGround(5, 0, 90, widthM: 0, coloured: coloured).Describe();
        var remarks = new List<Remark>();
        ClassifiedCloud classes = new ClassifyStage().Run(
            new ClassifyInput(described, HandLabels.None), new ClassifySettings(), StageContext.Plain(say: remarks.Add));
        Assert.Empty(classes.Dikes);
        Assert.All(classes.DikeProbability, p => Assert.Equal(0, p));
        Assert.True(classes.ThinnestDikeM > 0);
        Assert.Contains(remarks, r => r.Text.Contains("would have been missed", StringComparison.Ordinal));
        Assert.Equal(!coloured, remarks.Exists(r => r.Text.Contains("no colour", StringComparison.Ordinal)));
        Assert.Equal(coloured, classes.UsedColour);
    }

    // DESIGN section 5: none thicker than thinnest_dike_m would have been missed. The law: a strip whose width times the
    // evidence per area is below twice the price of boundary disappears (closed form; MaxFlowTests holds the flow itself to it).
    [Theory]
    [InlineData(60)]
    [InlineData(1000)]
    public void A_dike_just_thicker_than_the_thinnest_is_found_and_a_much_thinner_one_is_not_reported(double smoothingPerM)
    {
        var settings = new ClassifySettings { SmoothingPerM = smoothingPerM };
        double thinnest = Planted(2.5, settings).ThinnestDikeM;
        Assert.InRange(thinnest, 0.25, 2.2);
        Assert.Single(Planted(1.3 * thinnest, settings).Dikes);
        Assert.Empty(Planted(0.5 * thinnest, settings).Dikes);
    }

    // Scored on places that taught nothing. Outlines lie within a patch (15 cm) of the margins of a 2 m dike.
    [Fact]
    public void Labels_for_training_give_classes_that_check_labels_confirm()
    {
        (DescribedCloud described, bool[] truth) = new PaintedGround(9, 40, 80, widthM: 2).Describe();
        var points = new List<LabelPoint>();
        for (int i = 0; i < truth.Length; i += 131)
        {
            RockClass c = truth[i] ? RockClass.Dike : RockClass.Host;
            points.Add(new LabelPoint(described.Cloud.Place(i), c, points.Count % 4 == 0 ? LabelUse.Train : LabelUse.Check));
        }

        ClassifiedCloud classes = new ClassifyStage().Run(new ClassifyInput(described, new HandLabels { Points = [.. points] }), new ClassifySettings(), StageContext.Plain());
        Assert.Single(classes.Dikes);
        Assert.NotNull(classes.Check);
        Assert.InRange(classes.Check.Kappa, 0.93, 1);
        ClassSummary dike = Assert.Single(classes.Summary, s => s.Class == RockClass.Dike);
        Assert.InRange(dike.Iou!.Value, 0.9, 1);
    }

    [Fact]
    public void Any_number_of_threads_gives_the_same_bytes()
    {
        (DescribedCloud described, _) = new PaintedGround(6, 60, 80, widthM: 1.5).Describe();
        ClassifiedCloud one = Run(described, threads: 1), three = Run(described, threads: 3);
        Assert.Equal(one.Class, three.Class);
        Assert.Equal(one.DikeProbability, three.DikeProbability);
        Assert.Equal(one.Dikes[0].Windows, three.Dikes[0].Windows);
    }

    [Fact]
    public void Check_labels_judge_and_ignored_points_are_taken_out()
    {
        (DescribedCloud described, bool[] truth) = new PaintedGround(7, 60, 80, widthM: 2).Describe();
        var points = new List<LabelPoint>();
        for (int i = 0; i < truth.Length; i += 97)
        {
            RockClass c = truth[i] ? RockClass.Dike : RockClass.Host;
            points.Add(new LabelPoint(described.Cloud.Place(i), c, i % 2 == 0 ? LabelUse.Check : LabelUse.Train));
        }

        points.Add(new LabelPoint(described.Cloud.Place(1), RockClass.Host, LabelUse.Ignore));
        Vec3[] box = [new(-9, -9, 0), new(-6, -9, 0), new(-6, -6, 0), new(-9, -6, 0), new(-9, -9, 0)];
        var polygon = new LabelPolygon([box], double.NegativeInfinity, double.PositiveInfinity, RockClass.Host, LabelUse.Ignore);
        ClassifiedCloud classes = new ClassifyStage().Run(
            new ClassifyInput(described, new HandLabels { Points = [.. points], Polygons = [polygon] }), new ClassifySettings(), StageContext.Plain());
        Assert.NotNull(classes.Check);
        Assert.Equal(points.Count(p => p.Use == LabelUse.Check), classes.Check.Counts.Sum());
        for (int i = 0; i < described.Cloud.Count; i++)
        {
            if (described.Cloud.X[i] < -6.01 && described.Cloud.Y[i] < -6.01) Assert.Equal((byte)RockClass.Unknown, classes.Class[i]);
        }
    }

    [Fact]
    public void An_empty_cloud_gives_an_empty_result() =>
        Assert.Empty(Run(new DescribedCloud()).Class);

    [Fact]
    public void All_faults_of_settings_are_told()
    {
        var wrong = new ClassifySettings { PatchM = 0, SmoothingPerM = double.NaN, NarrowestDikeM = 2, WidestDikeM = 1, MostDikes = -1, FillIslandsM2 = -1 };
        Assert.Equal(
            ["classify.patch_m", "classify.smoothing_per_m", "classify.widest_dike_m", "classify.most_dikes", "classify.fill_islands_m2"],
            wrong.Check().Select(c => c.Key));
        Assert.Empty(new ClassifySettings().Check());
    }

    private static ClassifiedCloud Planted(double widthM, ClassifySettings settings) => new ClassifyStage().Run(
        new ClassifyInput(new PaintedGround(8, 70, 80, widthM).Describe().Described, HandLabels.None), settings, StageContext.Plain());

    private static ClassifiedCloud Run(DescribedCloud described, int threads = 2) =>
        new ClassifyStage().Run(new ClassifyInput(described, HandLabels.None), new ClassifySettings(), StageContext.Plain(threads: threads));
}
