using System.Buffers.Binary;
using CloudStruct.Formats.Bytes;
using static System.FormattableString;

namespace CloudStruct.Formats.Laz;

/// <summary>Where the chunks of a file stand.</summary>
internal static class ChunkTable
{
    /// <summary>One chunk.</summary>
    /// <param name="At">First byte.</param>
    /// <param name="Bytes">Length.</param>
    /// <param name="Points">Points.</param>
    internal readonly record struct Entry(long At, long Bytes, long Points);

    /// <summary>Reads the table.</summary>
    /// <returns>Null when there is none: the program that wrote the file stopped early, or the file is cut.</returns>
    /// <exception cref="LazDamageException">There is one, and it is impossible.</exception>
    public static Entry[]? Read(FileBytes file, LazLayout layout, long pointsAt, long points)
    {
        if (file.Length - pointsAt < 8) return null;
        long at = BinaryPrimitives.ReadInt64LittleEndian(file.Take(pointsAt, 8, "the place of the table of chunks"));
        if (at == -1) at = BinaryPrimitives.ReadInt64LittleEndian(file.Take(file.Length - 8, 8, "the place of the table of chunks"));
        if (at <= pointsAt || at > file.Length - 8) return null;
        byte[] head = file.Take(at, 8, "the table of chunks");
        uint version = BinaryPrimitives.ReadUInt32LittleEndian(head), count = BinaryPrimitives.ReadUInt32LittleEndian(head.AsSpan(4));
        if (version != 0) throw new LazDamageException(Invariant($"the table of chunks has version {version}; 0 is known"));
        if (count > ((ulong)file.Length / (ulong)(layout.RecordBytes + 4)) + 1) throw new LazDamageException(Invariant($"the table lists {count} chunks in a file of {file.Length} bytes"));
        if (count == 0) return points == 0 ? [] : throw new LazDamageException(Invariant($"the table lists no chunk, the header {points} points"));

        // An entry takes a few bytes; the table ends the file or stands before its last records.
        byte[] stream = file.Take(at + 8, Math.Min(file.Length - at - 8, 64 + (16L * count)), "the table of chunks");
        var decoder = new ArithmeticDecoder(stream, 0, stream.Length);
        var numbers = new IntegerCoder(32, 2);
        var entries = new Entry[count];
        uint own = 0, bytes = 0;
        long start = pointsAt + 8, seen = 0;
        for (int i = 0; i < entries.Length; i++)
        {
            if (layout.ChunkPoints == 0) own = unchecked((uint)numbers.Decode(decoder, (int)own, 0));
            bytes = unchecked((uint)numbers.Decode(decoder, (int)bytes, 1));
            long n = layout.ChunkPoints == 0 ? own : i < entries.Length - 1 ? layout.ChunkPoints : points - seen;
            if (n < 0 || n > points - seen) throw new LazDamageException(Invariant($"chunks hold more points than the {points} of the header"));
            if (bytes > at - start) throw new LazDamageException(Invariant($"chunk {i + 1} of {count} reaches into the table of chunks"));
            entries[i] = new Entry(start, bytes, n);
            start += bytes;
            seen += n;
        }

        return seen == points ? entries : throw new LazDamageException(Invariant($"chunks hold {seen} points, the header says {points}"));
    }

    /// <summary>The table as it stands in a file, from its version on.</summary>
    /// <param name="chunks">Points and bytes of each chunk.</param>
    /// <param name="differing">Whether chunks have their own number of points each.</param>
    public static byte[] Bytes(IReadOnlyList<(int Points, int Bytes)> chunks, bool differing)
    {
        byte[] head = new byte[8];
        BinaryPrimitives.WriteInt32LittleEndian(head.AsSpan(4), chunks.Count);
        if (chunks.Count == 0) return head;
        var encoder = new ArithmeticEncoder();
        var numbers = new IntegerCoder(32, 2);
        (int Points, int Bytes) before = default;
        foreach ((int Points, int Bytes) chunk in chunks)
        {
            if (differing) numbers.Encode(encoder, before.Points, chunk.Points, 0);
            numbers.Encode(encoder, before.Bytes, chunk.Bytes, 1);
            before = chunk;
        }

        encoder.Finish();
        return [.. head, .. encoder.Bytes];
    }
}
