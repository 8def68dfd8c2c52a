using CloudStruct.Maths.Blocks;

namespace CloudStruct.Tests.Maths.Blocks;

public sealed class ReadAheadTests
{
    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    public void Items_come_in_order_and_nothing_stays_open(int threads)
    {
        var made = new List<Item>();
        var seen = new List<int>();
        foreach (Item item in ReadAhead.Of(Items(made, 20, -1), threads))
        {
            using (item) seen.Add(item.Number);
        }

        Assert.Equal(Enumerable.Range(0, 20), seen);
        Assert.All(made, m => Assert.Equal(1, m.Disposed));
    }

    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    public void What_lies_ahead_is_let_go_when_the_caller_stops(int threads)
    {
        var made = new List<Item>();
        foreach (Item item in ReadAhead.Of(Items(made, 20, -1), threads))
        {
            item.Dispose();
            if (item.Number == 5) break;
        }

        Assert.InRange(made.Count, 6, 7);
        Assert.All(made, m => Assert.Equal(1, m.Disposed));
    }

    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    public void A_fault_of_the_source_reaches_the_caller_as_it_is(int threads)
    {
        var made = new List<Item>();
        var seen = new List<int>();
        Assert.Throws<InvalidDataException>(() =>
        {
            foreach (Item item in ReadAhead.Of(Items(made, 20, 7), threads))
            {
                using (item) seen.Add(item.Number);
            }
        });
        Assert.Equal(Enumerable.Range(0, 7), seen);
        Assert.All(made, m => Assert.Equal(1, m.Disposed));
    }

    private static IEnumerable<Item> Items(List<Item> made, int count, int fault)
    {
        for (int i = 0; i < count; i++)
        {
            if (i == fault) throw new InvalidDataException();
            var item = new Item(i);
            made.Add(item);
            yield return item;
        }
    }

    private sealed class Item(int number) : IDisposable
    {
        public int Number => number;

        public int Disposed { get; private set; }

        public void Dispose() => Disposed++;
    }
}
