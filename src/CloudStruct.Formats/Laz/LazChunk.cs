using System.Buffers.Binary;
using static System.FormattableString;

namespace CloudStruct.Formats.Laz;

/// <summary>One chunk being decoded: records come out in runs of any length, byte for byte as they were before compression.</summary>
internal sealed class LazChunk
{
    private readonly LazLayout layout;
    private readonly byte[] bytes;
    private readonly int end, recordBytes;
    private readonly PointwiseItem[] items = [];
    private readonly Companion[] companions = [];
    private readonly ArithmeticDecoder? stream;
    private readonly ArithmeticDecoder?[] layers = [];
    private readonly int[] layerEnds = [];
    private readonly Point14? point;
    private readonly byte[] record;
    private bool first = true;

    /// <summary>Opens a chunk.</summary>
    /// <param name="layout">How the file is compressed.</param>
    /// <param name="bytes">The chunk's bytes, at least those.</param>
    /// <param name="from">Its first byte.</param>
    /// <param name="end">Behind its last byte, or behind the last that it may have.</param>
    /// <param name="count">Points as the table has it; -1 when not known.</param>
    /// <exception cref="LazDamageException">The chunk's parts do not fit.</exception>
    public LazChunk(LazLayout layout, byte[] bytes, int from, int end, long count)
    {
        (this.layout, this.bytes, this.end) = (layout, bytes, end);
        recordBytes = layout.RecordBytes;
        if (end - from < recordBytes) throw new LazDamageException(Invariant($"a chunk of {end - from} bytes does not hold its first record"));
        record = bytes.AsSpan(from, recordBytes).ToArray();
        Points = count;
        int at = from + recordBytes;
        if (layout.Compressor != 3)
        {
            items = [.. layout.Items.Select(Pointwise)];
            stream = new ArithmeticDecoder(bytes, at, end);
            for (int i = 0, place = 0; i < items.Length; place += layout.Items[i].Bytes, i++) items[i].Start(record.AsSpan(place, layout.Items[i].Bytes));
            return;
        }

        int n = layout.LayerCount;
        if (end - at < 4 + (4 * n)) throw new LazDamageException("a chunk ends within its list of layers");
        uint stated = BinaryPrimitives.ReadUInt32LittleEndian(bytes.AsSpan(at));
        if (stated == 0 || (count >= 0 && stated != count)) throw new LazDamageException(Invariant($"a chunk says that it has {stated} points, the table of chunks {count}"));
        Points = stated;
        int sizes = at + 4;
        at = sizes + (4 * n);
        layers = new ArithmeticDecoder?[n];
        layerEnds = new int[n];
        for (int k = 0; k < n; k++)
        {
            uint size = BinaryPrimitives.ReadUInt32LittleEndian(bytes.AsSpan(sizes + (4 * k)));
            if (size > (uint)(end - at)) throw new LazDamageException(Invariant($"layer {k + 1} of a chunk reaches past its end"));
            if (size > 0) layers[k] = new ArithmeticDecoder(bytes, at, at + (int)size);
            else if (k == 0 && stated > 1) throw new LazDamageException("the first layer of a chunk is empty");
            at += (int)size;
            layerEnds[k] = at;
        }

        this.end = at;
        point = new Point14(record, layers[..Point14.LayerCount]);
        companions = [.. layout.Items.Skip(1).Select(Layered)];
        for (int i = 0, place = Point14.Bytes; i < companions.Length; place += companions[i].Bytes, i++) companions[i].Start(record.AsSpan(place), Point14.ChannelOf(record));
    }

    /// <summary>Points of the chunk; -1 when neither table nor chunk tells.</summary>
    public long Points { get; }

    /// <summary>Behind the last byte that was read.</summary>
    public int At => stream?.At ?? end;

    /// <summary>Decodes the next records.</summary>
    /// <param name="to">Takes them, one behind the other.</param>
    /// <param name="count">Records; no more than the chunk has left.</param>
    public void Read(Span<byte> to, int count)
    {
        for (int i = 0; i < count; i++)
        {
            if (first) first = false;
            else if (point is not null) NextLayered();
            else NextPointwise();
            record.CopyTo(to[(i * recordBytes)..]);
        }
    }

    /// <summary>After the last point every stream must stand at its end: the check that costs nothing.</summary>
    /// <exception cref="LazDamageException">It does not.</exception>
    public void CheckEnd()
    {
        if (stream is not null && stream.At != end) throw new LazDamageException(Invariant($"{end - stream.At} bytes of a chunk are left over"));
        for (int k = 0; k < layers.Length; k++)
        {
            if (layers[k] is { } l && l.At != layerEnds[k]) throw new LazDamageException(Invariant($"{layerEnds[k] - l.At} bytes of layer {k + 1} of a chunk are left over"));
        }
    }

    private static PointwiseItem Pointwise(LazItem item) => (item.Type, item.Version) switch
    {
        (6, 1) => new Point10First(),
        (6, _) => new Point10(),
        (7, 1) => new GpsTimeFirst(),
        (7, _) => new GpsTime(),
        (8, 1) => new ColourFirst(),
        (8, _) => new Colour(),
        (9, _) => new WavePacket(),
        (_, 1) => new ExtraBytesFirst(item.Bytes),
        _ => new ExtraBytes(item.Bytes),
    };

    /// <summary>The piece of an item that goes with the point item.</summary>
    public static Companion Layered(LazItem item) => item.Type switch
    {
        11 => new LayeredColour(false, item.Version >= 4),
        12 => new LayeredColour(true, item.Version >= 4),
        13 => new LayeredWave(item.Version >= 4),
        _ => new LayeredBytes(item.Bytes, item.Version >= 4),
    };

    private void NextPointwise()
    {
        int place = 0;
        for (int i = 0; i < items.Length; i++)
        {
            int size = layout.Items[i].Bytes;
            items[i].Next(stream!, record.AsSpan(place, size));
            place += size;
        }
    }

    private void NextLayered()
    {
        (int Channel, bool Changed) at = point!.Next(record.AsSpan(0, Point14.Bytes));
        int place = Point14.Bytes, layer = Point14.LayerCount;
        foreach (Companion c in companions)
        {
            c.Next(at, layers.AsSpan(layer, c.LayerCount), record.AsSpan(place, c.Bytes));
            place += c.Bytes;
            layer += c.LayerCount;
        }
    }
}
