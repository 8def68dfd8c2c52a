using CloudStruct.Maths.Fitting;
using CloudStruct.Maths.Kernels;
using CloudStruct.Maths.Neighbours;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Tests.Kit;
using CsCheck;

namespace CloudStruct.Tests.Maths.Kernels;

public class KernelTests
{
    private static readonly Gen<double> Entry = Gen.Double[-3, 3];

    [Fact]
    public void Closed_form_eigenvalues_and_axis_equal_those_of_the_turning_method()
    {
        Gen.Select(Entry, Entry, Entry, Entry, Entry, Entry).Sample((a, b, c, d, e, f) =>
        {
            // A covariance: sum of three outer products, the last one thin.
            Symmetric3 m = Symmetric3.Outer(new Vec3(a, b, c)) + Symmetric3.Outer(new Vec3(d, e, f)) + Symmetric3.Outer(new Vec3(b, -f, 1), 1e-4);
            Eigen3 slow = m.Eigen();
            (double l1, double l2, double l3) = SmallestAxis.Of(m, out Vec3 axis);
            Assert.Equal(slow.L1, l1, 1e-9 * (1 + slow.L1));
            Assert.Equal(slow.L2, l2, 1e-9 * (1 + slow.L1));
            Assert.Equal(slow.L3, l3, 1e-9 * (1 + slow.L1));
            Assert.Equal(1, axis.Length, 1e-9);
            if (slow.L2 > slow.L3 + (1e-3 * slow.L1)) Assert.True(axis.Cross(slow.V3).Length < 1e-5);
        });
    }

    [Theory]
    [InlineData(0)]
    [InlineData(2.5)]
    public void Equal_eigenvalues_give_some_unit_axis(double size)
    {
        (double l1, double l2, double l3) = SmallestAxis.Of(new Symmetric3(size, 0, 0, size, 0, size), out Vec3 axis);
        Assert.Equal((size, size, size), (l1, l2, l3));
        Assert.Equal(1, axis.Length, 1e-12);
        SmallestAxis.Of(new Symmetric3(4, 0, 0, 0, 0, 0), out Vec3 ofLine);
        Assert.Equal(0, ofLine.X, 1e-6);
        Assert.Equal(1, ofLine.Length, 1e-9);
    }

    [Fact]
    public void Weighted_sums_equal_a_plain_loop_at_every_length()
    {
        for (int count = 0; count <= 40; count++)
        {
            Vec3[] places = Clouds.Patch(new Vec3(0.1, 0.2, 0.3), new Vec3(1, 2, 3), 1, 1, count, 9, 0.1);
            int padded = (count + 7) & ~7;
            float[] x = new float[padded], y = new float[padded], z = new float[padded];
            Array.Fill(x, 1e18f);
            double w = 0, wx = 0, wyz = 0;
            for (int i = 0; i < count; i++)
            {
                (x[i], y[i], z[i]) = ((float)places[i].X, (float)places[i].Y, (float)places[i].Z);
                double dx = x[i] - 0.1f, dy = y[i] - 0.2f, dz = z[i] - 0.3f;
                double t = Math.Max(0, 1 - (((dx * dx) + (dy * dy) + (dz * dz)) / 0.16)), weight = t * t;
                w += weight;
                wx += weight * dx;
                wyz += weight * dy * dz;
            }

            LocalMoments sums = LocalMoments.About(x, y, z, 0.1f, 0.2f, 0.3f, 0.4f);
            Assert.Equal(w, sums.W, 1e-4);
            Assert.Equal(wx, sums.X, 1e-4);
            Assert.Equal(wyz, sums.Yz, 1e-5);
        }
    }

    [Fact]
    public void Joined_cells_equal_the_points_they_hold()
    {
        Vec3[] places = Clouds.Patch(new Vec3(2, 1, -3), new Vec3(0.4, 0.1, 0.8), 3, 2, 4000, 3, 0.05);
        (SortedGrid grid, float[] x, float[] y, float[] z) = Sorted(places, 0.11);
        var sums = CellSums.Of(grid, x, y, z, 2, CancellationToken.None);
        foreach (CellSums level in new[] { sums, sums.Coarser(out _), sums.Coarser(out _).Coarser(out _) })
        {
            // A radius that holds everything: every cell sees the scatter of the whole cloud.
            var whole = new Moments(new Vec3(2, 1, -3));
            for (int i = 0; i < x.Length; i++) whole.Add(x[i], y[i], z[i]);
            level.Around(10, 2, CancellationToken.None, (_, n, mean, covariance) =>
            {
                Assert.Equal(4000, n);
                Assert.True((mean - whole.Centroid).Length < 1e-9);
                Assert.Equal(whole.Covariance.Xz, covariance.Xz, 1e-9);
                Assert.Equal(whole.Covariance.Yy, covariance.Yy, 1e-9);
            });
        }
    }

    [Fact]
    public void A_ball_of_cells_holds_the_cells_whose_centroids_lie_in_it()
    {
        (SortedGrid grid, float[] x, float[] y, float[] z) = Sorted(Clouds.Patch(new Vec3(), new Vec3(0.4, 0.1, 0.8), 2, 2, 3000, 3, 0.05), 0.1);
        var sums = CellSums.Of(grid, x, y, z, 1, CancellationToken.None);
        Vec3[] centroid = [.. Enumerable.Range(0, grid.Keys.Length).Select(c =>
        {
            var m = new Moments(new Vec3());
            for (int i = grid.Starts[c]; i < grid.Starts[c + 1]; i++) m.Add(x[i], y[i], z[i]);
            return m.Centroid;
        })];
        sums.Around(0.35, 1, CancellationToken.None, (c, n, _, _) =>
        {
            int expected = Enumerable.Range(0, centroid.Length).Where(k => (centroid[k] - centroid[c]).Length <= 0.35).Sum(k => grid.Starts[k + 1] - grid.Starts[k]);
            Assert.Equal(expected, n);
        });
    }

    private static (SortedGrid Grid, float[] X, float[] Y, float[] Z) Sorted(Vec3[] places, double cell)
    {
        float[] x = [.. places.Select(p => (float)p.X)], y = [.. places.Select(p => (float)p.Y)], z = [.. places.Select(p => (float)p.Z)];
        (SortedGrid grid, int[] order) = GridBuilder.Build(x, y, z, (float)cell);
        return (grid, [.. order.Select(i => x[i])], [.. order.Select(i => y[i])], [.. order.Select(i => z[i])]);
    }
}
