using System.Buffers.Binary;

namespace CloudStruct.Formats.Laz;

/// <summary>Writes the points of a compressed file: place of the table, chunks, table.</summary>
/// <remarks>Chunks are encoded side by side and written in their order, so that the number of cores changes no byte.</remarks>
/// <param name="stream">Stands where the points begin; allows seeking.</param>
/// <param name="start">Where the file begins in the stream.</param>
/// <param name="layout">How it is compressed, with chunks of one size.</param>
/// <param name="threads">Chunks at once.</param>
internal sealed class LazPacker(Stream stream, long start, LazLayout layout, int threads)
{
    // A chunk of 46-byte records is 2.3 MB.
    private const int MostAtOnce = 16;

    private readonly List<(int Points, int Bytes)> chunks = [];
    private readonly long pointsAt = stream.Position;
    private readonly int recordBytes = layout.RecordBytes;
    private readonly ParallelOptions workers = new() { MaxDegreeOfParallelism = Math.Clamp(threads, 1, MostAtOnce) };

    /// <summary>Records to hand over at once.</summary>
    public int Batch => workers.MaxDegreeOfParallelism * (int)layout.ChunkPoints;

    /// <summary>Makes room for the place of the table: until it is known the points' own, which tells readers that there is none.</summary>
    public void Begin() => PutPlace(pointsAt - start);

    /// <summary>Writes records as chunks.</summary>
    /// <param name="records">Records, one behind the other.</param>
    /// <param name="count">How many: whole chunks, except at the end of the file.</param>
    public void Write(byte[] records, int count)
    {
        int size = (int)layout.ChunkPoints, n = (count + size - 1) / size;
        byte[][] done = new byte[n][];
        int Points(int k) => Math.Min(size, count - (k * size));
        Parallel.For(0, n, workers, k => done[k] = LazChunkBytes.Of(layout, records.AsSpan(k * size * recordBytes, Points(k) * recordBytes)));
        for (int k = 0; k < n; k++)
        {
            stream.Write(done[k]);
            chunks.Add((Points(k), done[k].Length));
        }
    }

    /// <summary>Writes the table and its place.</summary>
    public void Finish()
    {
        long at = stream.Position;
        stream.Write(ChunkTable.Bytes(chunks, differing: false));
        long end = stream.Position;
        stream.Position = pointsAt;
        PutPlace(at - start);
        stream.Position = end;
    }

    private void PutPlace(long at)
    {
        Span<byte> place = stackalloc byte[8];
        BinaryPrimitives.WriteInt64LittleEndian(place, at);
        stream.Write(place);
    }
}
