using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Stages.Describe;
using CloudStruct.Stages.Thin;
using CloudStruct.Tests.Kit;
using CsCheck;

namespace CloudStruct.Tests.Stages.Describe;

public class DescribeStageTests
{
    // The area of a rectangle is known; patches at all angles to the voxel grid, dense and sparse against the spacing.
    [Theory]
    [InlineData(0, 0, 1, 5)]
    [InlineData(0, 0, 1, 1)]
    [InlineData(1, 1, 1, 5)]
    [InlineData(1, 1, 1, 1)]
    [InlineData(0.3, 0.2, 1, 2)]
    [InlineData(1, 0, 1, 2)]
    public void Areas_of_the_points_of_a_patch_sum_up_to_its_area(double nx, double ny, double nz, double pointsPerSpacing)
    {
        const double length = 2, width = 1.5, spacing = 0.03;
        int count = (int)(length * width / spacing / spacing * pointsPerSpacing);
        WorkingCloud cloud = Clouds.Thin(Clouds.Patch(new Vec3(1, 2, 3), new Vec3(nx, ny, nz), length, width, count, 3, 0.002), spacing, dropStray: false);
        double area = Clouds.Describe(cloud).AreaM2.Sum(a => (double)a);
        Assert.InRange(area / (length * width), 0.96, 1.04);
    }

    [Fact]
    public void Normals_of_a_noisy_plane_are_its_normal_and_roughness_its_noise()
    {
        Vec3 normal = new Vec3(0.4, -0.5, 0.7).Unit();
        WorkingCloud cloud = Clouds.Thin(Clouds.Patch(new Vec3(), normal, 6, 6, 40_000, 3, 0.006), 0.03, dropStray: false);
        DescribedCloud d = Clouds.Describe(cloud);
        double[] off = [.. Enumerable.Range(0, cloud.Count).Select(i => Math.Asin(Math.Min(1, d.Normal(i).Cross(normal).Length)) * 180 / Math.PI).Order()];
        Assert.True(off[off.Length / 2] < 1.5 && off[^(off.Length / 100)] < 6, $"median {off[off.Length / 2]}, 99 % {off[^(off.Length / 100)]}");
        Assert.Equal(0.006, d.RoughnessM.Average(), 0.001);
        Assert.InRange(d.NoiseM, 0.0045, 0.009);
        for (int i = 0; i < cloud.Count; i++) Assert.Equal(1, d.Normal(i).Length, 1e-5);
    }

    [Fact]
    public void Across_a_sharp_edge_each_point_keeps_the_normal_of_its_own_side()
    {
        // Two faces at right angles; the edge runs along y.
        Vec3[] top = [.. Clouds.Patch(new Vec3(-1, 0, 0), new Vec3(0, 0, 1), 4, 2, 40_000, 3, 0.003).Where(p => p.X < 0)];
        Vec3[] wall = [.. Clouds.Patch(new Vec3(0, 0, -1), new Vec3(1, 0, 0), 4, 4, 60_000, 4, 0.003).Where(p => p.Z < 0 && Math.Abs(p.Y) < 2)];
        WorkingCloud cloud = Clouds.Thin([.. top, .. wall], 0.02, dropStray: false);
        DescribedCloud d = Clouds.Describe(cloud);
        Vec3 origin = cloud.Frame.Origin;
        int near = 0, wrong = 0;
        for (int i = 0; i < cloud.Count; i++)
        {
            Vec3 p = cloud.Place(i) + origin;
            bool isTop = p.X < -0.012 && p.Z > -0.012, isWall = p.Z < -0.012 && p.X > -0.012;
            double fromEdge = isTop ? -p.X : -p.Z;
            if ((!isTop && !isWall) || fromEdge > 0.1) continue;
            near++;
            if ((isTop ? Math.Abs(d.NormalZ[i]) : Math.Abs(d.NormalX[i])) < Math.Cos(20 * Math.PI / 180)) wrong++;
        }

        Assert.True(near > 500);
        Assert.True(wrong < 0.02 * near, $"{wrong} of {near}");
    }

    [Fact]
    public void A_shift_changes_nothing_and_a_quarter_turn_turns_the_normals()
    {
        Gen.Select(Gen.ULong[1, 1000], Gen.Double[-0.9, 0.9], Gen.Double[-0.9, 0.9]).Sample(
            (seed, a, b) =>
            {
                Vec3[] places = Clouds.Patch(new Vec3(), new Vec3(a, b, 1), 2, 2, 3000, seed, 0.004);
                DescribedCloud first = Clouds.Describe(Clouds.Thin(places, 0.05, dropStray: false));

                // Whole voxels, and whole metres so that the frame moves along.
                DescribedCloud moved = Clouds.Describe(Clouds.Thin([.. places.Select(p => p + new Vec3(500_000, -30, 7))], 0.05, dropStray: false));
                Assert.Equal(first.Cloud.Count, moved.Cloud.Count, first.Cloud.Count * 0.01);
                Assert.Equal(first.AreaM2.Sum(), moved.AreaM2.Sum(), 0.05);
                Assert.Equal(Mean(first), Mean(moved), (x, y) => x.Cross(y).Length < 0.005);

                DescribedCloud turned = Clouds.Describe(Clouds.Thin([.. places.Select(p => new Vec3(-p.Y, p.X, p.Z))], 0.05, dropStray: false));
                Vec3 n = Mean(first);
                Assert.Equal(new Vec3(-n.Y, n.X, n.Z), Mean(turned), (x, y) => x.Cross(y).Length < 0.01);
            },
            iter: 8);
    }

    [Fact]
    public void A_small_smooth_ball_without_noise_gets_its_normals_and_radii_of_its_own_size()
    {
        // A hand specimen of 6 cm: points on a sphere, radial normals known.
        Vec3[] places = [.. Clouds.Patch(new Vec3(), new Vec3(0, 0, 1), 2, 2, 40_000, 3, 1).Select(p => p.Unit() * 0.03)];
        WorkingCloud cloud = Clouds.Thin(places);
        DescribedCloud d = Clouds.Describe(cloud);
        Assert.Equal(40_000, cloud.Support.Sum() + cloud.StrayPoints);
        Assert.True(cloud.SpacingM < 0.001 && d.RoughnessRadiusM < 0.02);
        double[] off = [.. Enumerable.Range(0, cloud.Count).Select(i => d.Normal(i).Cross((cloud.Place(i) + cloud.Frame.Origin).Unit()).Length).Order()];
        Assert.True(off[off.Length / 2] < 0.05, $"median sine {off[off.Length / 2]}");
        Assert.True(off[^(off.Length / 50)] < 0.25, $"98 % sine {off[^(off.Length / 50)]}");
        Assert.InRange(d.AreaM2.Sum() / (4 * Math.PI * 0.03 * 0.03), 0.95, 1.05);
    }

    [Fact]
    public void Threads_change_no_byte()
    {
        Vec3[] places = [.. Clouds.Patch(new Vec3(), new Vec3(0.2, 0, 1), 8, 8, 40_000, 3, 0.005), .. Clouds.Patch(new Vec3(4, 0, -2), new Vec3(1, 0.1, 0), 8, 4, 20_000, 4, 0.005), new Vec3(0, 0, 3)];
        DescribedCloud one = Clouds.Describe(Clouds.Thin(places, threads: 1), threads: 1);
        DescribedCloud four = Clouds.Describe(Clouds.Thin(places, threads: 4), threads: 4);
        Assert.Equal(one.Cloud.X, four.Cloud.X);
        Assert.Equal(one.Cloud.Neighbours, four.Cloud.Neighbours);
        Assert.Equal(one.NormalX, four.NormalX);
        Assert.Equal(one.NormalZ, four.NormalZ);
        Assert.Equal(one.RoughnessM, four.RoughnessM);
        Assert.Equal(one.Planarity, four.Planarity);
        Assert.Equal(one.AreaM2, four.AreaM2);
        Assert.Equal(one.NoiseM, four.NoiseM);
    }

    [Fact]
    public void Roughness_and_planarity_over_wide_radii_equal_those_of_brute_force_within_the_roughness_of_their_rim()
    {
        WorkingCloud cloud = Clouds.Thin(Clouds.Patch(new Vec3(), new Vec3(0.3, 0.2, 1), 4, 4, 12_000, 3, 0.02), 0.05, dropStray: false);
        DescribedCloud d = Clouds.Describe(cloud, new DescribeSettings { RoughnessRadiusM = 0.6 });
        Assert.Equal(0.6, d.RoughnessRadiusM);
        for (int i = 0; i < cloud.Count; i += 97)
        {
            Vec3[] near = [.. Enumerable.Range(0, cloud.Count).Select(cloud.Place).Where(p => (p - cloud.Place(i)).Length < 0.6)];
            Assert.Equal(CloudStruct.Maths.Fitting.PlaneFit.To(near).RmsM, d.RoughnessM[i], 0.003);
        }
    }

    [Fact]
    public void Colour_of_a_clipped_point_comes_from_its_neighbours()
    {
        Vec3[] places = Clouds.Patch(new Vec3(), new Vec3(0, 0, 1), 2, 2, 1600, 3);
        (ushort, ushort, ushort)[] colours = [.. places.Select((_, i) => i % 10 == 0 ? ((ushort)255, (ushort)255, (ushort)255) : ((ushort)120, (ushort)80, (ushort)60))];
        IPieces pieces = Clouds.Intake(Clouds.Survey(new MemorySource(places, colours)));
        DescribedCloud d = Clouds.Describe(new ThinStage().Run(pieces, new ThinSettings { SpacingM = 0.01, DropStray = false }, StageContext.Plain()));
        (float expected, _) = RockColour.LogRatios(120, 80, 60);
        Assert.True(d.LogRedGreen.Count(v => Math.Abs(v - expected) < 0.02) > 0.97 * d.Cloud.Count);
    }

    [Fact]
    public void A_colourless_cloud_has_no_colour_columns()
    {
        DescribedCloud d = Clouds.Describe(Clouds.Thin(Clouds.Patch(new Vec3(), new Vec3(0, 0, 1), 2, 2, 1600, 3)));
        Assert.Empty(d.LStar);
        Assert.Empty(d.LogRedGreen);
    }

    private static Vec3 Mean(DescribedCloud d)
    {
        var sum = new Vec3();
        for (int i = 0; i < d.Cloud.Count; i++) sum += d.Normal(i);
        return sum.Unit();
    }
}
