namespace CloudStruct.Maths.Blocks;

/// <summary>Parallel work cut by length, never by thread count, and folded in order: any thread count gives the same bytes.</summary>
public static class BlockParallel
{
    /// <summary>Items in a block: long enough that a block outweighs its scheduling, short enough to balance two cores.</summary>
    public const int Length = 4096;

    /// <summary>Calls the body for every block [from, to). Blocks must not write to each other's places.</summary>
    /// <param name="count">Items in all.</param>
    /// <param name="threads">Workers, at least 1.</param>
    /// <param name="stop">Checked before each block.</param>
    /// <param name="body">From (inclusive), to (exclusive).</param>
    /// <param name="length">Items in a block.</param>
    public static void For(int count, int threads, CancellationToken stop, Action<int, int> body, int length = Length) =>
        For(count, threads, stop, () => 0, (from, to, _) => body(from, to), length);

    /// <summary>The same with scratch memory per worker. The scratch must not carry results from block to block.</summary>
    /// <param name="count">Items in all.</param>
    /// <param name="threads">Workers, at least 1.</param>
    /// <param name="stop">Checked before each block.</param>
    /// <param name="scratch">Makes the scratch memory of one worker.</param>
    /// <param name="body">From (inclusive), to (exclusive), scratch.</param>
    /// <param name="length">Items in a block.</param>
    public static void For<TScratch>(
        int count, int threads, CancellationToken stop, Func<TScratch> scratch, Action<int, int, TScratch> body, int length = Length)
    {
        int blocks = (int)(((long)count + length - 1) / length);
        if (blocks == 0) return;
        if (threads <= 1 || blocks == 1)
        {
            TScratch own = scratch();
            for (int b = 0; b < blocks; b++)
            {
                stop.ThrowIfCancellationRequested();
                body(b * length, Math.Min(count, (b * length) + length), own);
            }

            return;
        }

        Parallel.For(
            0,
            blocks,
            new ParallelOptions { MaxDegreeOfParallelism = threads, CancellationToken = stop },
            scratch,
            (b, _, own) =>
            {
                body(b * length, Math.Min(count, (b * length) + length), own);
                return own;
            },
            _ => { });
    }

    /// <summary>One result per block, in order of the blocks.</summary>
    /// <param name="count">Items in all.</param>
    /// <param name="threads">Workers.</param>
    /// <param name="stop">Checked before each block.</param>
    /// <param name="partOfBlock">From (inclusive), to (exclusive) to the block's part.</param>
    /// <param name="length">Items in a block.</param>
    public static TPart[] Map<TPart>(
        int count, int threads, CancellationToken stop, Func<int, int, TPart> partOfBlock, int length = Length)
    {
        var parts = new TPart[(int)(((long)count + length - 1) / length)];
        For(count, threads, stop, (from, to) => parts[from / length] = partOfBlock(from, to), length);
        return parts;
    }

    /// <summary>Sum over blocks, folded in order.</summary>
    /// <param name="count">Items in all.</param>
    /// <param name="threads">Workers.</param>
    /// <param name="stop">Checked before each block.</param>
    /// <param name="sumOfBlock">From (inclusive), to (exclusive) to the block's sum.</param>
    public static double Sum(int count, int threads, CancellationToken stop, Func<int, int, double> sumOfBlock)
    {
        double total = 0;
        foreach (double part in Map(count, threads, stop, sumOfBlock)) total += part;
        return total;
    }
}
