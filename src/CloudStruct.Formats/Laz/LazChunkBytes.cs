using System.Buffers.Binary;

namespace CloudStruct.Formats.Laz;

/// <summary>Records of one chunk to its compressed bytes: the mirror of <see cref="LazChunk"/>. Chunks know nothing of each other.</summary>
internal static class LazChunkBytes
{
    /// <summary>Encodes a chunk.</summary>
    /// <param name="layout">How the file is compressed: items of version 2 or layered ones, without wave packets.</param>
    /// <param name="records">One record or more, one behind the other.</param>
    public static byte[] Of(LazLayout layout, ReadOnlySpan<byte> records) => layout.Compressor == 3 ? Layered(layout, records) : Pointwise(layout, records);

    private static byte[] Pointwise(LazLayout layout, ReadOnlySpan<byte> records)
    {
        int size = layout.RecordBytes;
        IPointwisePut[] items = [.. layout.Items.Select(Put)];
        var stream = new ArithmeticEncoder(records.Length / 4);
        int place = 0;
        for (int i = 0; i < items.Length; place += layout.Items[i].Bytes, i++) ((PointwiseItem)items[i]).Start(records[place..]);
        for (int at = size; at < records.Length; at += size)
        {
            place = at;
            for (int i = 0; i < items.Length; i++)
            {
                items[i].Put(stream, records.Slice(place - size, layout.Items[i].Bytes), records.Slice(place, layout.Items[i].Bytes));
                place += layout.Items[i].Bytes;
            }
        }

        stream.Finish();
        return [.. records[..size], .. stream.Bytes];
    }

    private static IPointwisePut Put(LazItem item) => (item.Type, item.Version) switch
    {
        (6, 2) => new Point10(),
        (7, 2) => new GpsTime(),
        (8, 2) => new Colour(),
        (0, 2) => new ExtraBytes(item.Bytes),
        _ => throw new NotSupportedException("this compression item is read, not written"),
    };

    private static byte[] Layered(LazLayout layout, ReadOnlySpan<byte> records)
    {
        int size = layout.RecordBytes, layer = 0;
        var streams = new ArithmeticEncoder?[layout.LayerCount];
        for (; layer < Point14.LayerCount; layer++) streams[layer] = Open(Point14.Needs(layer, records, size), records.Length / size);
        Companion[] companions = [.. layout.Items.Skip(1).Select(LazChunk.Layered)];
        int place = Point14.Bytes;
        foreach (Companion c in companions)
        {
            c.Start(records[place..], Point14.ChannelOf(records));
            for (int k = 0; k < c.LayerCount; k++) streams[layer++] = Open(c.Needs(k, records, size, place), records.Length / size);
            place += c.Bytes;
        }

        var point = new Point14(records, streams[..Point14.LayerCount]);
        for (int at = size; at < records.Length; at += size)
        {
            (int Channel, bool Changed) where = point.Put(records.Slice(at, Point14.Bytes));
            place = at + Point14.Bytes;
            layer = Point14.LayerCount;
            foreach (Companion c in companions)
            {
                c.Put(where, streams.AsSpan(layer, c.LayerCount), records.Slice(place, c.Bytes));
                place += c.Bytes;
                layer += c.LayerCount;
            }
        }

        return Joined(records[..size], records.Length / size, streams);
    }

    private static ArithmeticEncoder? Open(bool needed, int points) => needed ? new ArithmeticEncoder(points) : null;

    // First record, number of points with it, size of each layer, layers.
    private static byte[] Joined(ReadOnlySpan<byte> first, int count, ArithmeticEncoder?[] streams)
    {
        foreach (ArithmeticEncoder? s in streams) s?.Finish();
        int sizes = first.Length + 4, at = sizes + (4 * streams.Length);
        byte[] chunk = new byte[at + streams.Sum(s => s?.Bytes.Length ?? 0)];
        first.CopyTo(chunk);
        BinaryPrimitives.WriteInt32LittleEndian(chunk.AsSpan(first.Length), count);
        for (int k = 0; k < streams.Length; k++)
        {
            if (streams[k] is not { } s) continue;
            BinaryPrimitives.WriteInt32LittleEndian(chunk.AsSpan(sizes + (4 * k)), s.Bytes.Length);
            s.Bytes.CopyTo(chunk.AsSpan(at));
            at += s.Bytes.Length;
        }

        return chunk;
    }
}
