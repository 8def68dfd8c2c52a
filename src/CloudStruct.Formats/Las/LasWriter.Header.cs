using System.Buffers.Binary;
using System.Text;
using CloudStruct.Formats.Laz;

namespace CloudStruct.Formats.Las;

public sealed partial class LasWriter
{
    private const string ProjectionUser = "LASF_Projection";
    private const string SpecUser = "LASF_Spec";
    private const int CompressedBit = 1 << 7;
    private const int VariableHeaderBytes = 54;
    private const int ExtraDescriptorBytes = 192;

    private static int HeaderBytes(LasLayout layout) => layout.Minor >= 4 ? 375 : 227;

    private byte[] Header(int variableRecords)
    {
        byte[] h = new byte[HeaderBytes(layout)];
        "LASF"u8.CopyTo(h);
        // Bit 4: the coordinate system is WKT; the standard demands it of point formats 6 to 10.
        Put16(h, 6, layout.Minor >= 4 ? 1 << 4 : 0);
        h[24] = 1;
        h[25] = (byte)layout.Minor;
        PutText(h.AsSpan(26, 32), layout.SystemIdentifier);
        PutText(h.AsSpan(58, 32), "CloudStruct");
        if (layout.Date is DateOnly date)
        {
            Put16(h, 90, date.DayOfYear);
            Put16(h, 92, date.Year);
        }
        Put16(h, 94, h.Length);
        BinaryPrimitives.WriteUInt32LittleEndian(h.AsSpan(96), checked((uint)pointsAt));
        BinaryPrimitives.WriteUInt32LittleEndian(h.AsSpan(100), (uint)variableRecords);
        h[104] = (byte)(layout.PointFormat | (layout.Compressed ? CompressedBit : 0));
        Put16(h, 105, recordBytes);
        if (layout.Minor < 4)
        {
            if (count > uint.MaxValue) throw new InvalidOperationException("LAS 1.2 holds at most 4294967295 points");
            BinaryPrimitives.WriteUInt32LittleEndian(h.AsSpan(107), (uint)count);
            BinaryPrimitives.WriteUInt32LittleEndian(h.AsSpan(111), (uint)count);
        }
        else
        {
            BinaryPrimitives.WriteUInt64LittleEndian(h.AsSpan(247), (ulong)count);
            BinaryPrimitives.WriteUInt64LittleEndian(h.AsSpan(255), (ulong)count);
        }
        PutDoubles(h, 131, layout.Scale.X, layout.Scale.Y, layout.Scale.Z, layout.Offset.X, layout.Offset.Y, layout.Offset.Z);
        if (count > 0)
        {
            // From the stored integers, as a reader computes them: then no point lies outside by a rounding.
            static double At(int v, double scale, double offset) => (v * scale) + offset;
            PutDoubles(h, 179,
                At(maxX, layout.Scale.X, layout.Offset.X), At(minX, layout.Scale.X, layout.Offset.X),
                At(maxY, layout.Scale.Y, layout.Offset.Y), At(minY, layout.Scale.Y, layout.Offset.Y),
                At(maxZ, layout.Scale.Z, layout.Offset.Z), At(minZ, layout.Scale.Z, layout.Offset.Z));
        }
        return h;
    }

    private static byte[][] VariableRecords(LasLayout layout)
    {
        var records = new List<byte[]>();
        if (layout.Minor < 4 && layout.Epsg > 0) records.Add(Record(ProjectionUser, 34735, "GeoTIFF keys", Keys(layout.Epsg)));
        else if (layout.Wkt.Length > 0) records.Add(Record(ProjectionUser, 2112, "WKT of the coordinate system", [.. Encoding.UTF8.GetBytes(layout.Wkt), 0]));
        if (layout.Extras.Length > 0) records.Add(Record(SpecUser, 4, "Extra bytes", Descriptors(layout.Extras)));
        if (layout.Compressed) records.Add(Record(LazLayout.User, LazLayout.Id, "Compressed points", LazLayout.For(layout.PointFormat, RecordBytes(layout)).Write()));
        return [.. records];
    }

    // GeoTIFF 1.1: header (version 1, revision 1.0, three keys), then model type projected, raster type, projected system.
    private static byte[] Keys(int epsg)
    {
        if (epsg > ushort.MaxValue) throw new ArgumentException("GeoTIFF keys hold EPSG codes up to 65535");
        int[] words = [1, 1, 0, 3, 1024, 0, 1, 1, 1025, 0, 1, 1, 3072, 0, 1, epsg];
        byte[] keys = new byte[2 * words.Length];
        for (int i = 0; i < words.Length; i++) Put16(keys, 2 * i, words[i]);
        return keys;
    }

    private static byte[] Descriptors(LasExtra[] extras)
    {
        byte[] all = new byte[ExtraDescriptorBytes * extras.Length];
        for (int i = 0; i < extras.Length; i++)
        {
            Span<byte> d = all.AsSpan(i * ExtraDescriptorBytes, ExtraDescriptorBytes);
            d[2] = (byte)extras[i].Type;
            PutText(d.Slice(4, 32), extras[i].Name);
            PutText(d.Slice(160, 32), extras[i].Description);
        }
        return all;
    }

    private static byte[] Record(string user, int id, string description, byte[] content)
    {
        if (content.Length > ushort.MaxValue) throw new ArgumentException($"a variable length record holds 65535 bytes, not {content.Length}");
        byte[] record = new byte[VariableHeaderBytes + content.Length];
        PutText(record.AsSpan(2, 16), user);
        Put16(record, 18, id);
        Put16(record, 20, content.Length);
        PutText(record.AsSpan(22, 32), description);
        content.CopyTo(record, VariableHeaderBytes);
        return record;
    }

    private static void Put16(Span<byte> to, int at, int value) =>
        BinaryPrimitives.WriteUInt16LittleEndian(to[at..], checked((ushort)value));

    private static void PutDoubles(byte[] to, int at, params ReadOnlySpan<double> values)
    {
        foreach (double v in values)
        {
            BinaryPrimitives.WriteDoubleLittleEndian(to.AsSpan(at), v);
            at += 8;
        }
    }

    // Cut at a whole character: half of a UTF-8 sequence would be read as garbage.
    private static void PutText(Span<byte> to, string text)
    {
        int used = 0;
        foreach (Rune rune in text.EnumerateRunes())
        {
            if (used + rune.Utf8SequenceLength > to.Length) break;
            used += rune.EncodeToUtf8(to[used..]);
        }
    }
}
