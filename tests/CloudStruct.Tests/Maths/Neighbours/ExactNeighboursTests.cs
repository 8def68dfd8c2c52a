using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Neighbours;
using CloudStruct.Records.Points;

namespace CloudStruct.Tests.Maths.Neighbours;

public sealed class ExactNeighboursTests
{
    [Theory]
    [InlineData(1, 900)]
    [InlineData(16, 3000)]
    [InlineData(16, 12)]   // fewer points than neighbours wanted
    [InlineData(64, 700)]
    public void Distances_are_those_of_brute_force(int k, int n)
    {
        (float[] x, float[] y, float[] z) = Rock(n);
        int[] found = ExactNeighbours.Of(x, y, z, k, 2, CancellationToken.None);
        for (int i = 0; i < n; i++)
        {
            float[] all = [.. Enumerable.Range(0, n).Where(j => j != i).Select(j => Distance2(x, y, z, i, j)).Order().Take(k)];
            int[] row = found[(i * k)..((i + 1) * k)];
            Assert.Equal(all, row.Where(j => j >= 0).Select(j => Distance2(x, y, z, i, j)));
            Assert.Equal(all.Length, row.Where(j => j >= 0 && j != i).Distinct().Count());
        }
    }

    [Fact]
    public void Any_number_of_threads_gives_the_same()
    {
        (float[] x, float[] y, float[] z) = Rock(20_000);
        int[] one = ExactNeighbours.Of(x, y, z, 16, 1, CancellationToken.None);
        Assert.Equal(one, ExactNeighbours.Of(x, y, z, 16, 2, CancellationToken.None));
        Assert.Equal(one, ExactNeighbours.Of(x, y, z, 16, 4, CancellationToken.None));
    }

    [Fact]
    public void One_place_many_times_and_no_points_at_all()
    {
        Assert.Empty(ExactNeighbours.Of([], [], [], 3, 2, CancellationToken.None));
        Assert.Equal([-1, -1], ExactNeighbours.Of([1], [1], [1], 2, 2, CancellationToken.None));
        Assert.Equal([1, 2, 0, 2, 0, 1], ExactNeighbours.Of([5, 5, 5], [1, 1, 1], [0, 0, 0], 2, 2, CancellationToken.None));
    }

    [Fact]
    public void Within_a_radius_lie_those_that_brute_force_finds()
    {
        (float[] x, float[] y, float[] z) = Rock(2500);
        const float radius = 0.25f;
        (SortedGrid grid, int[] order) = GridBuilder.Build(x, y, z, 0.3f);
        (x, y, z) = ([.. order.Select(i => x[i])], [.. order.Select(i => y[i])], [.. order.Select(i => z[i])]);
        foreach (int threads in new[] { 1, 2, 4 })
        {
            (long[] starts, int[] all) = RadiusNeighbours.Of(grid, x, y, z, radius, threads, CancellationToken.None);
            for (int i = 0; i < x.Length; i++)
            {
                IEnumerable<int> wanted = Enumerable.Range(0, x.Length).Where(j => j != i && Distance2(x, y, z, i, j) <= radius * radius);
                Assert.Equal(wanted, all[(int)starts[i]..(int)starts[i + 1]].Order());
            }
        }

        Assert.Throws<ArgumentOutOfRangeException>(() => RadiusNeighbours.Of(grid, x, y, z, 0.31f, 1, CancellationToken.None));
    }

    // Two walls that meet at an edge, denser toward one side, with far-off outliers.
    private static (float[] X, float[] Y, float[] Z) Rock(int n)
    {
        float[] x = new float[n], y = new float[n], z = new float[n];
        for (int i = 0; i < n; i++)
        {
            var draws = new Draws(11, 2, (ulong)i);
            float u = (float)Math.Pow(draws.NextUnit(), 2) * 4, v = (float)draws.NextUnit() * 3, noise = (float)draws.NextNormal() * 0.005f;
            (x[i], y[i], z[i]) = i % 2 == 0 ? (u, v, noise) : (noise, v, u);
            if (i % 250 == 7) (x[i], y[i], z[i]) = (x[i] + 40, y[i] - 25, z[i] + 90);
        }

        return (x, y, z);
    }

    private static float Distance2(float[] x, float[] y, float[] z, int i, int j)
    {
        float dx = x[j] - x[i], dy = y[j] - y[i], dz = z[j] - z[i];
        return (dx * dx) + (dy * dy) + (dz * dz);
    }
}
