using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Neighbours;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Tests.Kit;
using CsCheck;

namespace CloudStruct.Tests.Maths.Neighbours;

public class NearestNeighboursTests
{
    private const int K = 16;

    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(17)]
    [InlineData(400)]
    [InlineData(3000)]
    public void Neighbours_equal_those_of_brute_force_by_distance(int count)
    {
        foreach (double cell in new[] { 0.02, 0.11, 0.5 })
        {
            (SortedGrid grid, float[] x, float[] y, float[] z) = Sorted(Clouds.Patch(new Vec3(3, -2, 5), new Vec3(0.3, -0.5, 0.6), 2, 1.3, count, 5, 0.02), cell);
            var neighbours = new int[count * K];
            NearestNeighbours.Fill(grid, x, y, z, K, neighbours, null, 2, CancellationToken.None);
            float reach = 2 * grid.CellM;
            for (int i = 0; i < count; i++)
            {
                float[] expected = [.. Enumerable.Range(0, count).Where(j => j != i).Select(j => Square(x, y, z, i, j)).Where(d => d <= reach * reach).Order().Take(K)];
                int[] row = neighbours[(i * K)..((i + 1) * K)];
                float[] found = [.. row.Where(j => j >= 0).Select(j => Square(x, y, z, i, j))];
                Assert.Equal(expected, found);
                Assert.DoesNotContain(i, row);
                Assert.Equal(found.Length, row.Where(j => j >= 0).Distinct().Count());
            }
        }
    }

    [Fact]
    public void Many_points_at_one_place_are_each_others_neighbours_in_order_of_index()
    {
        (SortedGrid grid, float[] x, float[] y, float[] z) = Sorted([.. Enumerable.Repeat(new Vec3(1, 2, 3), 40)], 0.1);
        var neighbours = new int[40 * K];
        NearestNeighbours.Fill(grid, x, y, z, K, neighbours, null, 1, CancellationToken.None);
        Assert.Equal(Enumerable.Range(1, K), neighbours[..K]);
        Assert.Equal(Enumerable.Range(0, K), neighbours[(30 * K)..(31 * K)]);
    }

    [Fact]
    public void Threads_do_not_change_a_neighbour()
    {
        (SortedGrid grid, float[] x, float[] y, float[] z) = Sorted(Clouds.Patch(new Vec3(), new Vec3(0.1, 0.9, 0.2), 9, 7, 20_000, 9, 0.01), 0.2);
        int[] one = new int[20_000 * K], four = new int[20_000 * K];
        NearestNeighbours.Fill(grid, x, y, z, K, one, null, 1, CancellationToken.None);
        NearestNeighbours.Fill(grid, x, y, z, K, four, null, 4, CancellationToken.None);
        Assert.Equal(one, four);
    }

    [Fact]
    public void Only_wanted_rows_are_written()
    {
        (SortedGrid grid, float[] x, float[] y, float[] z) = Sorted(Clouds.Patch(new Vec3(), new Vec3(0, 0, 1), 1, 1, 500, 4), 0.15);
        var wanted = new bool[500];
        wanted[123] = true;
        int[] all = new int[500 * K], some = new int[500 * K];
        Array.Fill(some, -7);
        NearestNeighbours.Fill(grid, x, y, z, K, all, null, 1, CancellationToken.None);
        NearestNeighbours.Fill(grid, x, y, z, K, some, wanted, 1, CancellationToken.None);
        Assert.Equal(all[(123 * K)..(124 * K)], some[(123 * K)..(124 * K)]);
        Assert.Equal(499 * K, some.Count(v => v == -7));
    }

    [Fact]
    public void Order_by_digits_equals_a_stable_sort()
    {
        Gen.Long[0, 1L << 62].Array[0, 300].Sample(keys =>
        {
            Array.Resize(ref keys, keys.Length + (keys.Length / 2));   // repeated keys: zeros
            int[] order = RadixOrder.Of(keys);
            return order.SequenceEqual(Enumerable.Range(0, keys.Length).OrderBy(i => keys[i]));
        });
    }

    [Fact]
    public void Lookup_finds_what_brute_force_finds()
    {
        WorkingCloud cloud = Clouds.Thin(Clouds.Patch(new Vec3(), new Vec3(0.2, 0.1, 0.9), 3, 2, 4000, 8, 0.01));
        var found = new List<int>();
        for (int q = 0; q < 200; q++)
        {
            var draws = new Draws(4, 5, (ulong)q);
            float x = (float)((draws.NextUnit() - 0.5) * 4), y = (float)((draws.NextUnit() - 0.5) * 3), z = (float)((draws.NextUnit() - 0.5) * 2);
            var place = new Vec3(x, y, z);
            double[] distances = [.. Enumerable.Range(0, cloud.Count).Select(i => (cloud.Place(i) - place).Length)];
            int nearest = SortedGridLookup.Nearest(cloud, x, y, z, 0.4);
            if (distances.Min() > 0.4) Assert.Equal(-1, nearest);
            else Assert.Equal(distances.Min(), distances[nearest], 1e-9);
            SortedGridLookup.Within(cloud, x, y, z, 0.4, found);
            Assert.Equal(Enumerable.Range(0, cloud.Count).Where(i => distances[i] <= 0.4), found.Order());
        }
    }

    private static (SortedGrid Grid, float[] X, float[] Y, float[] Z) Sorted(Vec3[] places, double cell)
    {
        float[] x = [.. places.Select(p => (float)p.X)], y = [.. places.Select(p => (float)p.Y)], z = [.. places.Select(p => (float)p.Z)];
        (SortedGrid grid, int[] order) = GridBuilder.Build(x, y, z, (float)cell);
        return (grid, [.. order.Select(i => x[i])], [.. order.Select(i => y[i])], [.. order.Select(i => z[i])]);
    }

    private static float Square(float[] x, float[] y, float[] z, int i, int j)
    {
        float dx = x[j] - x[i], dy = y[j] - y[i], dz = z[j] - z[i];
        return (dx * dx) + (dy * dy) + (dz * dz);
    }
}
