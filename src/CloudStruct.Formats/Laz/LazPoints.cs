using CloudStruct.Formats.Bytes;
using CloudStruct.Records.Complaints;
using static System.FormattableString;

namespace CloudStruct.Formats.Laz;

/// <summary>The point records of a compressed file, as they were before compression, in file order.</summary>
internal sealed class LazPoints
{
    // A chunk is some 50,000 points; beyond this a chunk is decoded in runs instead of at once.
    private const int MostRecordsBytes = 1 << 26;

    private readonly FileBytes file;
    private readonly LazLayout layout;
    private readonly long pointsAt, points;
    private readonly ChunkTable.Entry[]? table;

    /// <summary>Prepares reading.</summary>
    /// <exception cref="InputException">The table of chunks is impossible.</exception>
    public LazPoints(FileBytes file, LazLayout layout, long pointsAt, long points)
    {
        (this.file, this.layout, this.pointsAt, this.points) = (file, layout, pointsAt, points);
        if (layout.Compressor >= 2 && points > 0) table = Guarded(0, points, () => ChunkTable.Read(file, layout, pointsAt, points));
    }

    /// <summary>Runs of whole records.</summary>
    /// <exception cref="InputException">A chunk is damaged; the message has its number and the points in it.</exception>
    public IEnumerable<(byte[] Records, int Count)> Read(CancellationToken stop) => points == 0 ? [] : table is not null ? ByTable(stop) : InSequence(stop);

    // As many chunks at once as there are cores; they come out in their order, so that cores change nothing.
    private IEnumerable<(byte[] Records, int Count)> ByTable(CancellationToken stop)
    {
        int batch = Math.Max(2, Environment.ProcessorCount);
        long firstPoint = 0;
        for (int from = 0; from < table!.Length; from += batch)
        {
            stop.ThrowIfCancellationRequested();
            int n = Math.Min(batch, table.Length - from), first = from;
            long[] starts = new long[n];
            for (int k = 0; k < n; k++)
            {
                starts[k] = firstPoint;
                firstPoint += table[first + k].Points;
            }

            if (Enumerable.Range(first, n).Any(i => table[i].Points * layout.RecordBytes > MostRecordsBytes || table[i].Bytes > MostRecordsBytes))
            {
                for (int k = 0; k < n; k++)
                {
                    foreach ((byte[], int) run in InRuns(first + k, starts[k], stop)) yield return run;
                }

                continue;
            }

            var done = new byte[n][];
            var faults = new InputException?[n];
            Parallel.For(0, n, new ParallelOptions { CancellationToken = stop, MaxDegreeOfParallelism = batch }, k =>
            {
                try
                {
                    done[k] = Whole(first + k, starts[k]);
                }
                catch (InputException e)
                {
                    faults[k] = e;   // the first in the file is told, not the first in time
                }
            });
            for (int k = 0; k < n; k++)
            {
                if (faults[k] is { } fault) throw fault;
                if (table[first + k].Points > 0) yield return (done[k], (int)table[first + k].Points);
            }
        }
    }

    private byte[] Whole(int chunk, long firstPoint)
    {
        ChunkTable.Entry e = table![chunk];
        if (e.Points == 0) return [];
        byte[] bytes = file.Take(e.At, e.Bytes, Invariant($"chunk {chunk + 1}"));
        return Guarded(firstPoint, e.Points, () =>
        {
            var decoder = new LazChunk(layout, bytes, 0, bytes.Length, e.Points);
            byte[] records = new byte[e.Points * layout.RecordBytes];
            decoder.Read(records, (int)e.Points);
            decoder.CheckEnd();
            return records;
        }, chunk);
    }

    private IEnumerable<(byte[] Records, int Count)> InRuns(int chunk, long firstPoint, CancellationToken stop)
    {
        ChunkTable.Entry e = table![chunk];
        if (e.Points == 0) yield break;
        byte[] bytes = file.Take(e.At, e.Bytes, Invariant($"chunk {chunk + 1}"));
        LazChunk decoder = Guarded(firstPoint, e.Points, () => new LazChunk(layout, bytes, 0, bytes.Length, e.Points), chunk);
        foreach ((byte[], int) run in Runs(decoder, firstPoint, e.Points, chunk, stop)) yield return run;
        Guarded(firstPoint, e.Points, () => decoder.CheckEnd(), chunk);
    }

    private IEnumerable<(byte[] Records, int Count)> Runs(LazChunk decoder, long firstPoint, long count, int chunk, CancellationToken stop)
    {
        int most = Math.Max(1, (1 << 21) / layout.RecordBytes);
        for (long done = 0; done < count;)
        {
            stop.ThrowIfCancellationRequested();
            int n = (int)Math.Min(most, count - done);
            byte[] records = new byte[n * layout.RecordBytes];
            Guarded(firstPoint + done, n, () => decoder.Read(records, n), chunk);
            done += n;
            yield return (records, n);
        }
    }

    // Without a table chunks are found one behind the other: a layered one tells its length, another ends where its decoder stops.
    private IEnumerable<(byte[] Records, int Count)> InSequence(CancellationToken stop)
    {
        if (layout is { Compressor: 2, ChunkPoints: 0 })
            throw Damaged(0, points, "the table of chunks is missing, and chunks of differing size cannot be found without it", null, null);
        long at = layout.Compressor == 1 ? pointsAt : pointsAt + 8, done = 0;
        if (file.Length - at > Array.MaxLength) throw Damaged(0, points, "the file has no table of chunks and is too large to be read without one", null, null);
        byte[] bytes = file.Take(at, file.Length - at, "the points");
        int from = 0;
        for (int chunk = 0; done < points; chunk++)
        {
            int start = from;
            long first = done, known = layout.Compressor == 3 ? -1 : layout.Compressor == 1 ? points : Math.Min(layout.ChunkPoints, points - done);
            LazChunk decoder = Guarded(first, known < 0 ? 1 : known, () => new LazChunk(layout, bytes, start, bytes.Length, known), chunk);
            long count = Math.Min(decoder.Points, points - done);
            foreach ((byte[], int) run in Runs(decoder, first, count, chunk, stop)) yield return run;
            done += count;
            from = decoder.At;
        }
    }

    private void Guarded(long firstPoint, long count, Action act, int? chunk = null) => Guarded(firstPoint, count, () =>
    {
        act();
        return 0;
    }, chunk);

    private T Guarded<T>(long firstPoint, long count, Func<T> act, int? chunk = null)
    {
        try
        {
            return act();
        }
        catch (LazDamageException e)
        {
            throw Damaged(firstPoint, count, e.Message, chunk, e);
        }
    }

    private InputException Damaged(long firstPoint, long count, string fact, int? chunk, Exception? inner) => new(
        chunk is { } c ? Invariant($"{file.Name}, chunk {c + 1}, points {firstPoint + 1} to {firstPoint + count}") : Invariant($"{file.Name}, byte {pointsAt}"),
        "the compressed points are damaged", fact, "The copy is incomplete or damaged; copy the file again, or export it again", inner);
}
