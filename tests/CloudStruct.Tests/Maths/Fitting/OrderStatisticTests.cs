using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Fitting;

namespace CloudStruct.Tests.Maths.Fitting;

public sealed class OrderStatisticTests
{
    [Fact]
    public void Gives_what_a_full_sort_puts_there()
    {
        foreach (int n in new[] { 1, 2, 3, 24, 25, 26, 100, 1000, 5000 })
        {
            for (int kind = 0; kind < 4; kind++)
            {
                var draws = new Draws((ulong)n, 1, (ulong)kind);
                double[] values = [.. Enumerable.Range(0, n).Select(i => kind switch
                {
                    0 => draws.NextUnit(),
                    1 => draws.NextBelow(5),      // many equal values
                    2 => i,                       // sorted already
                    _ => n - i,                   // and the wrong way round
                })];
                double[] sorted = [.. values.Order()];
                foreach (int place in new[] { 0, n / 10, n / 2, n - 1 })
                    Assert.Equal(sorted[place], OrderStatistic.Nth<double>(values.ToArray(), place));
            }
        }
    }

    [Fact]
    public void Floats_and_infinity_are_ordered_too()
    {
        float[] values = [.. Enumerable.Range(0, 200).Select(i => i % 3 == 0 ? float.PositiveInfinity : (float)(i * 37 % 101))];
        float[] sorted = [.. values.Order()];
        Assert.Equal(sorted[150], OrderStatistic.Nth<float>(values.ToArray(), 150));
        Assert.Equal(sorted[20], OrderStatistic.Nth<float>(values.ToArray(), 20));
    }

    [Fact]
    public void A_place_beyond_the_values_is_refused() =>
        Assert.Throws<ArgumentOutOfRangeException>(() => OrderStatistic.Nth<double>(new double[3], 3));
}
