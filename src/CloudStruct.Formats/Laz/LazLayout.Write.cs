using System.Buffers.Binary;
using static System.FormattableString;

namespace CloudStruct.Formats.Laz;

internal sealed partial record LazLayout
{
    /// <summary>Points of a chunk in files that are written: what readers expect, and enough for the models to learn.</summary>
    public const int UsualChunkPoints = 50_000;

    // Version of the compression scheme that the streams follow; readers take it as a remark.
    private static readonly byte[] Scheme = [3, 4, 3, 0];

    private static readonly int[] Sizes = [0, 0, 0, 0, 0, 0, 20, 8, 6, 29, 30, 6, 8, 29, 0];

    /// <summary>How points of a format are written: version 2 in one stream up to format 5, version 3 in layers from 6 on.</summary>
    /// <param name="pointFormat">0 to 3 or 6 to 8.</param>
    /// <param name="recordBytes">Bytes of a record, extra bytes included.</param>
    /// <param name="chunkPoints">Points of a chunk; 0 when every chunk has its own number.</param>
    /// <exception cref="ArgumentException">A format with wave packets, or records that are too short for their format.</exception>
    public static LazLayout For(int pointFormat, int recordBytes, uint chunkPoints = UsualChunkPoints)
    {
        if (pointFormat is not (>= 0 and <= 3 or >= 6 and <= 8)) throw new ArgumentException(Invariant($"point format {pointFormat} is not written compressed"), nameof(pointFormat));
        bool layered = pointFormat >= 6;
        int version = layered ? 3 : 2;
        List<LazItem> items = [.. Expected[pointFormat].Select(type => new LazItem(type, Sizes[type], version))];
        int extra = recordBytes - items.Sum(i => i.Bytes);
        if (extra < 0) throw new ArgumentException(Invariant($"records of {recordBytes} bytes are too short for point format {pointFormat}"), nameof(recordBytes));
        if (extra > 0) items.Add(new LazItem(layered ? 14 : 0, extra, version));
        return new LazLayout { Compressor = layered ? 3 : 2, ChunkPoints = chunkPoints, Items = [.. items] };
    }

    /// <summary>Content of the compression record.</summary>
    public byte[] Write()
    {
        byte[] b = new byte[34 + (6 * Items.Length)];
        Put(b, 0, Compressor);
        Scheme.CopyTo(b, 4);
        BinaryPrimitives.WriteUInt32LittleEndian(b.AsSpan(12), ChunkPoints == 0 ? Variable : ChunkPoints);
        b.AsSpan(16, 16).Fill(255);   // no special records
        Put(b, 32, Items.Length);
        for (int i = 0; i < Items.Length; i++)
        {
            Put(b, 34 + (6 * i), Items[i].Type);
            Put(b, 36 + (6 * i), Items[i].Bytes);
            Put(b, 38 + (6 * i), Items[i].Version);
        }

        return b;
    }

    private static void Put(byte[] to, int at, int value) => BinaryPrimitives.WriteUInt16LittleEndian(to.AsSpan(at), (ushort)value);
}
