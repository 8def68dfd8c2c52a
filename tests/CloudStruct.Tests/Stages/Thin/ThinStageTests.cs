using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Stages.Thin;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Stages.Thin;

public class ThinStageTests
{
    [Fact]
    public void Every_input_point_finds_the_working_point_that_stands_for_it()
    {
        Vec3[] places = Clouds.Patch(new Vec3(5, 5, 5), new Vec3(0.4, -0.3, 1), 4, 4, 30_000, 2, 0.004);
        IPieces pieces = Clouds.Intake(Clouds.Survey(new MemorySource(places)));
        WorkingCloud cloud = new ThinStage().Run(pieces, new ThinSettings { SpacingM = 0.06 }, StageContext.Plain());
        Assert.Equal(30_000, cloud.Support.Sum() + cloud.StrayPoints);
        foreach (Vec3 p in Clouds.All(pieces))
        {
            int i = SortedGridLookup.Nearest(cloud, (float)p.X, (float)p.Y, (float)p.Z, 0.06 * Math.Sqrt(3));
            Assert.True(i >= 0);
        }
    }

    [Fact]
    public void Working_points_are_real_points_one_in_a_voxel_with_the_mean_colour()
    {
        Vec3[] places = Clouds.Patch(new Vec3(), new Vec3(0, 0.3, 1), 3, 3, 20_000, 3, 0.003);
        (ushort, ushort, ushort)[] colours = [.. places.Select((_, i) => (i % 2 == 0 ? ((ushort)100, (ushort)60, (ushort)20) : ((ushort)110, (ushort)80, (ushort)40)))];
        IPieces pieces = Clouds.Intake(Clouds.Survey(new MemorySource(places, colours) { Class = 6 }));
        WorkingCloud cloud = new ThinStage().Run(pieces, new ThinSettings { SpacingM = 0.15 }, StageContext.Plain());
        var real = new HashSet<Vec3>(Clouds.All(pieces));
        var voxels = new HashSet<(double, double, double)>();
        for (int i = 0; i < cloud.Count; i++)
        {
            Assert.Contains(cloud.Place(i), real);
            Assert.True(voxels.Add((Math.Floor(cloud.X[i] / 0.15), Math.Floor(cloud.Y[i] / 0.15), Math.Floor(cloud.Z[i] / 0.15))));
            Assert.Equal(6, cloud.SourceClass[i]);
        }

        double red = 0, count = 0;
        for (int i = 0; i < cloud.Count; i++)
        {
            red += (double)cloud.Red[i] * cloud.Support[i];
            count += cloud.Support[i];
        }

        Assert.Equal(105, red / count, 0.3);
    }

    [Fact]
    public void Points_lie_in_the_order_of_the_grid_and_neighbours_ascend_in_distance()
    {
        WorkingCloud cloud = Clouds.Thin(Clouds.Patch(new Vec3(), new Vec3(0.3, 0.1, 1), 5, 5, 20_000, 3, 0.003));
        Assert.Equal(cloud.Count, cloud.Grid.Starts[^1]);
        for (int c = 0; c < cloud.Grid.Keys.Length; c++)
        {
            for (int i = cloud.Grid.Starts[c]; i < cloud.Grid.Starts[c + 1]; i++)
            {
                long ix = SortedGridLookup.CellOf(cloud.Grid, cloud.X[i], cloud.Grid.MinX), iy = SortedGridLookup.CellOf(cloud.Grid, cloud.Y[i], cloud.Grid.MinY);
                long iz = SortedGridLookup.CellOf(cloud.Grid, cloud.Z[i], cloud.Grid.MinZ);
                Assert.Equal(cloud.Grid.Keys[c], (((iz * cloud.Grid.NY) + iy) * cloud.Grid.NX) + ix);
                double before = 0;
                for (int k = 0; k < WorkingCloud.K && cloud.Neighbours[(i * WorkingCloud.K) + k] >= 0; k++)
                {
                    double d = (cloud.Place(cloud.Neighbours[(i * WorkingCloud.K) + k]) - cloud.Place(i)).Length;
                    Assert.True(d >= before - 1e-7);
                    before = d;
                }
            }
        }
    }

    [Fact]
    public void Stray_points_and_small_floating_clusters_go_with_those_they_stand_for()
    {
        Vec3[] rock = Clouds.Patch(new Vec3(), new Vec3(0.1, 0, 1), 10, 10, 40_000, 4, 0.004);
        Vec3[] single = [.. Enumerable.Range(0, 30).Select(i => new Vec3(-4 + (0.27 * i), 1, 1.1 + (0.05 * (i % 7))))];
        Vec3[] cluster = Clouds.Patch(new Vec3(2, 3, 3), new Vec3(0, 0, 1), 0.2, 0.2, 15, 6);
        Vec3[] hugging = [.. Enumerable.Range(0, 12).Select(i => new Vec3(-4 + (0.6 * i), -2, 0.25 - (0.1 * (-4 + (0.6 * i)))))];
        var remarks = new List<Remark>();
        IPieces pieces = Clouds.Intake(Clouds.Survey(new MemorySource([.. rock, .. single, .. cluster, .. hugging])));
        WorkingCloud cloud = new ThinStage().Run(pieces, new ThinSettings(), StageContext.Plain(say: remarks.Add));
        Vec3 origin = cloud.Frame.Origin;
        bool OnRock(int i) => Math.Abs(new Vec3(0.1, 0, 1).Unit().Dot(cloud.Place(i) + origin)) < 0.03;
        Assert.Equal(0, Enumerable.Range(0, cloud.Count).Count(i => !OnRock(i)));
        Assert.Equal(57, cloud.StrayPoints);
        Assert.Contains(remarks, r => r.Text.StartsWith("57 stray points", StringComparison.Ordinal));

        // What is left has the neighbours that it would have without the stray points.
        WorkingCloud clean = new ThinStage().Run(
            Clouds.Intake(Clouds.Survey(new MemorySource(rock)) with { OffsetM = new Vec3() }), new ThinSettings { SpacingM = cloud.SpacingM }, StageContext.Plain());
        Assert.Equal(clean.Count, cloud.Count);
    }

    [Fact]
    public void Sparse_walls_are_not_stray()
    {
        // A quarter of the density: as a steep wall seen from above.
        Vec3[] places = [.. Clouds.Patch(new Vec3(), new Vec3(0, 0, 1), 10, 10, 40_000, 4), .. Clouds.Patch(new Vec3(5, 0, -2.5), new Vec3(1, 0, 0), 5, 10, 5000, 5)];
        Assert.Equal(0, Clouds.Thin(places).StrayPoints);
    }

    [Fact]
    public void A_cloud_of_scattered_points_is_uneven_not_stray_and_it_is_said()
    {
        Vec3[] places = [.. Clouds.Patch(new Vec3(), new Vec3(0, 0, 1), 4, 4, 4000, 4), .. Clouds.Patch(new Vec3(40, 0, 0), new Vec3(0, 0, 1), 60, 60, 1000, 5)];
        var remarks = new List<Remark>();
        WorkingCloud cloud = new ThinStage().Run(Clouds.Intake(Clouds.Survey(new MemorySource(places))), new ThinSettings(), StageContext.Plain(say: remarks.Add));
        Assert.Equal(0, cloud.StrayPoints);
        Assert.Contains(remarks, r => r.Doubtful && r.Text.Contains("uneven", StringComparison.Ordinal));
    }

    [Fact]
    public void Automatic_spacing_follows_the_input_and_the_limit()
    {
        Vec3[] places = Clouds.Patch(new Vec3(), new Vec3(0.2, 0.2, 1), 20, 20, 100_000, 4);
        Assert.InRange(Clouds.Thin(places).SpacingM, 0.060, 0.068);
        IPieces pieces = Clouds.Intake(Clouds.Survey(new MemorySource(places)));
        WorkingCloud few = new ThinStage().Run(pieces, new ThinSettings { MaxPoints = 10_000 }, StageContext.Plain());
        Assert.InRange(few.Count, 5000, 11_000);
    }

    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(3)]
    public void Tiny_clouds_pass(int count)
    {
        WorkingCloud cloud = Clouds.Thin([.. Enumerable.Range(0, count).Select(i => new Vec3(i, 2 * i, 0))]);
        Assert.Equal(count, cloud.Count);
        Assert.Equal(count, Clouds.Describe(cloud).AreaM2.Length);
    }

    [Fact]
    public void All_points_equal_and_points_on_a_line_pass()
    {
        WorkingCloud one = new ThinStage().Run(
            Clouds.Intake(Clouds.Survey(new MemorySource([.. Enumerable.Repeat(new Vec3(3, 4, 5), 50)]))), new ThinSettings(), StageContext.Plain());
        Assert.Equal(1, one.Count);
        DescribedCloud line = Clouds.Describe(Clouds.Thin([.. Enumerable.Range(0, 500).Select(i => new Vec3(0.01 * i, 0.02 * i, 0.005 * i))]));
        Assert.All(line.NormalX, n => Assert.True(float.IsFinite(n)));
        Assert.All(line.AreaM2, a => Assert.True(a >= 0 && float.IsFinite(a)));
    }

    [Fact]
    public void Bad_settings_are_all_named()
    {
        string[] keys = [.. new ThinSettings { SpacingM = double.NaN, MaxPoints = 5, StrayClusterPoints = -1 }.Check().Select(c => c.Key)];
        Assert.Equal(["thin.spacing_m", "thin.max_points", "thin.stray_cluster_points"], keys);
        Assert.Empty(new ThinSettings().Check());
    }
}
