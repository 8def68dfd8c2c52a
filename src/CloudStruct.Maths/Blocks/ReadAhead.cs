namespace CloudStruct.Maths.Blocks;

/// <summary>Takes the next item from a source while the caller still works on the last one.</summary>
public static class ReadAhead
{
    /// <summary>The same items in the same order; the source is advanced on another thread, one item ahead.</summary>
    /// <typeparam name="T">An item that its receiver disposes of.</typeparam>
    /// <param name="source">Read to its end, or until the caller stops: what lies ahead is then disposed of here.</param>
    /// <param name="threads">With one nothing is read ahead.</param>
    public static IEnumerable<T> Of<T>(IEnumerable<T> source, int threads)
        where T : class, IDisposable
    {
        if (threads <= 1)
        {
            foreach (T item in source) yield return item;
            yield break;
        }

        using IEnumerator<T> items = source.GetEnumerator();
        T? Take() => items.MoveNext() ? items.Current : null;
        Task<T?> next = Task.Run(Take);
        try
        {
            while (next.GetAwaiter().GetResult() is { } item)
            {
                next = Task.Run(Take);
                yield return item;
            }
        }
        finally
        {
            Task.WaitAny(next);   // waits without throwing: the source must not be closed under its reader
            if (next.IsCompletedSuccessfully) next.Result?.Dispose();
        }
    }
}
