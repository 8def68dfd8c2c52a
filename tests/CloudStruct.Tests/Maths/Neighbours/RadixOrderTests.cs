using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Neighbours;

namespace CloudStruct.Tests.Maths.Neighbours;

public sealed class RadixOrderTests
{
    [Theory]
    [InlineData(20)]   // key and place in one number
    [InlineData(55)]   // too long for that
    public void Any_number_of_threads_gives_the_stable_order(int bits)
    {
        var draws = new Draws(3, 1, 4);
        long[] keys = [.. Enumerable.Range(0, 200_000).Select(_ => (long)(draws.NextBits() >> (64 - bits)))];
        for (int i = 0; i < keys.Length; i += 3) keys[i] = keys[i / 2];
        int[] wanted = [.. Enumerable.Range(0, keys.Length).OrderBy(i => keys[i])];
        foreach (int threads in new[] { 1, 2, 4, 7 }) Assert.Equal(wanted, RadixOrder.Of(keys, threads));
    }

    [Fact]
    public void No_keys_and_one_key_have_an_order()
    {
        Assert.Empty(RadixOrder.Of([], 2));
        Assert.Equal([0], RadixOrder.Of([0], 2));
        Assert.Equal([1, 0], RadixOrder.Of([long.MaxValue, 5], 2));
    }
}
