namespace CloudStruct.Simulate.Chance;

/// <summary>Parallel loops over blocks of fixed length: what a block gives never depends on the number of threads.</summary>
internal static class Workers
{
    /// <summary>Calls the body for every run [from, to) of items.</summary>
    public static void For(int count, int threads, int length, Action<int, int> body)
    {
        int blocks = (count + length - 1) / length;
        Parallel.For(
            0,
            blocks,
            new ParallelOptions { MaxDegreeOfParallelism = Math.Max(1, threads) },
            b => body(b * length, Math.Min(count, (b + 1) * length)));
    }
}
