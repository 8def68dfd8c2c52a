using System.Buffers.Binary;

namespace CloudStruct.Formats.GeoTiff;

/// <summary>Lays a TIFF out: header, directory, values that do not fit into it, tiles.</summary>
internal static class TiffFile
{
    private const int Header = 8, Entry = 12;
    private const ushort TileOffsets = 324;

    /// <summary>Writes all.</summary>
    /// <param name="stream">Written from its present position.</param>
    /// <param name="tags">In any order; that of tile offsets is filled in here.</param>
    /// <param name="tiles">In order.</param>
    public static void Write(Stream stream, List<TiffTag> tags, byte[][] tiles)
    {
        TiffTag[] sorted = [.. tags.OrderBy(t => t.Number)];
        int directory = 2 + (Entry * sorted.Length) + 4, at = Header + directory;
        int[] placed = new int[sorted.Length];
        for (int i = 0; i < sorted.Length; i++)
        {
            if (sorted[i].Bytes.Length <= 4) continue;
            placed[i] = at;
            at += (sorted[i].Bytes.Length + 1) & ~1;   // values start on even bytes
        }

        byte[] offsets = sorted.Single(t => t.Number == TileOffsets).Bytes;
        int end = at;
        for (int t = 0; t < tiles.Length; t++)
        {
            BinaryPrimitives.WriteInt32LittleEndian(offsets.AsSpan(4 * t), end);
            end = checked(end + ((tiles[t].Length + 1) & ~1));
        }

        byte[] head = new byte[at];
        (head[0], head[1], head[2]) = ((byte)'I', (byte)'I', 42);
        BinaryPrimitives.WriteInt32LittleEndian(head.AsSpan(4), Header);
        BinaryPrimitives.WriteUInt16LittleEndian(head.AsSpan(Header), (ushort)sorted.Length);
        for (int i = 0; i < sorted.Length; i++)
        {
            Span<byte> entry = head.AsSpan(Header + 2 + (Entry * i), Entry);
            BinaryPrimitives.WriteUInt16LittleEndian(entry, sorted[i].Number);
            BinaryPrimitives.WriteUInt16LittleEndian(entry[2..], sorted[i].Type);
            BinaryPrimitives.WriteInt32LittleEndian(entry[4..], sorted[i].Count);
            if (placed[i] == 0) sorted[i].Bytes.CopyTo(entry[8..]);
            else
            {
                BinaryPrimitives.WriteInt32LittleEndian(entry[8..], placed[i]);
                sorted[i].Bytes.CopyTo(head.AsSpan(placed[i]));
            }
        }

        stream.Write(head);
        foreach (byte[] tile in tiles)
        {
            stream.Write(tile);
            if (tile.Length % 2 != 0) stream.WriteByte(0);
        }
    }
}
