using System.Buffers.Binary;
using static System.FormattableString;

namespace CloudStruct.Formats.Laz;

/// <summary>How the points of a file are compressed, as its compression record says.</summary>
internal sealed partial record LazLayout
{
    /// <summary>User and number of the record.</summary>
    public const string User = "laszip encoded";

    /// <summary>Number of the record.</summary>
    public const int Id = 22204;

    private const uint Variable = 0xFFFFFFFF;

    // Items of each point format, without the surplus bytes.
    private static readonly int[][] Expected = [[6], [6, 7], [6, 8], [6, 7, 8], [6, 7, 9], [6, 7, 8, 9], [10], [10, 11], [10, 12], [10, 13], [10, 12, 13]];

    /// <summary>0 none, 1 one run, 2 chunks, 3 chunks of layers.</summary>
    public required int Compressor { get; init; }

    /// <summary>Points in a chunk; 0 when every chunk has its own number.</summary>
    public required uint ChunkPoints { get; init; }

    /// <summary>Pieces of the record in order.</summary>
    public required LazItem[] Items { get; init; }

    /// <summary>Bytes of an uncompressed record.</summary>
    public int RecordBytes => Items.Sum(i => i.Bytes);

    /// <summary>Reads the record.</summary>
    /// <param name="bytes">Its content.</param>
    /// <param name="pointFormat">Point format of the header, without its compression bit.</param>
    /// <param name="recordBytes">Record length of the header.</param>
    /// <exception cref="LazDamageException">It does not fit the header, or asks for what does not exist.</exception>
    public static LazLayout Read(ReadOnlySpan<byte> bytes, int pointFormat, int recordBytes)
    {
        if (bytes.Length < 34) throw new LazDamageException(Invariant($"the compression record has {bytes.Length} bytes, 34 are the least"));
        int compressor = BinaryPrimitives.ReadUInt16LittleEndian(bytes), coder = BinaryPrimitives.ReadUInt16LittleEndian(bytes[2..]), count = BinaryPrimitives.ReadUInt16LittleEndian(bytes[32..]);
        if (compressor > 3) throw new LazDamageException(Invariant($"compressor {compressor} does not exist"));
        if (coder != 0) throw new LazDamageException(Invariant($"coder {coder} does not exist"));
        if (count == 0 || bytes.Length < 34 + (6 * count)) throw new LazDamageException(Invariant($"{count} compression items in a record of {bytes.Length} bytes"));
        var items = new LazItem[count];
        for (int i = 0; i < count; i++)
        {
            ReadOnlySpan<byte> b = bytes[(34 + (6 * i))..];
            items[i] = new LazItem(BinaryPrimitives.ReadUInt16LittleEndian(b), BinaryPrimitives.ReadUInt16LittleEndian(b[2..]), BinaryPrimitives.ReadUInt16LittleEndian(b[4..]));
            if (compressor != 0 && (!items[i].IsKnown || items[i].IsLayered != (compressor == 3)))
                throw new LazDamageException(Invariant($"compression item {i + 1} is type {items[i].Type}, {items[i].Bytes} bytes, version {items[i].Version}, which compressor {compressor} does not know"));
        }

        uint chunk = BinaryPrimitives.ReadUInt32LittleEndian(bytes[12..]);
        var layout = new LazLayout { Compressor = compressor, ChunkPoints = chunk == Variable ? 0 : chunk, Items = items };
        int[] expected = Expected[pointFormat];
        bool fits = items.Length >= expected.Length && items.Length <= expected.Length + 1 && expected.Index().All(e => items[e.Index].Type == e.Item)
            && (items.Length == expected.Length || items[^1].Type is 0 or 14);
        if (!fits || layout.RecordBytes != recordBytes)
            throw new LazDamageException(Invariant($"compression items of {layout.RecordBytes} bytes ({string.Join(", ", items.Select(i => i.Type))}) do not fit point format {pointFormat} with records of {recordBytes} bytes"));
        return layout;
    }

    /// <summary>Layers of a chunk, when layered.</summary>
    public int LayerCount => Items.Sum(i => i.Type switch { 10 => Point14.LayerCount, 12 => 2, 14 => i.Bytes, _ => 1 });
}
