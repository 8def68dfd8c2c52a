using System.Buffers.Binary;
using System.Text;

namespace CloudStruct.Formats.GeoTiff;

/// <summary>One entry of a TIFF directory (TIFF 6.0, section 2).</summary>
/// <param name="Number">Tag.</param>
/// <param name="Type">2 text, 3 short, 4 long, 12 double.</param>
/// <param name="Count">Values.</param>
/// <param name="Bytes">The values, little-endian; for the offsets of tiles filled in when the file is laid out.</param>
internal sealed record TiffTag(ushort Number, ushort Type, int Count, byte[] Bytes)
{
    public static TiffTag Short(ushort number, ushort value) => Shorts(number, [value]);

    public static TiffTag Shorts(ushort number, ushort[] values)
    {
        byte[] bytes = new byte[2 * values.Length];
        for (int i = 0; i < values.Length; i++) BinaryPrimitives.WriteUInt16LittleEndian(bytes.AsSpan(2 * i), values[i]);
        return new TiffTag(number, 3, values.Length, bytes);
    }

    public static TiffTag Long(ushort number, int value) => Longs(number, [value]);

    public static TiffTag Longs(ushort number, int[] values)
    {
        byte[] bytes = new byte[4 * values.Length];
        for (int i = 0; i < values.Length; i++) BinaryPrimitives.WriteInt32LittleEndian(bytes.AsSpan(4 * i), values[i]);
        return new TiffTag(number, 4, values.Length, bytes);
    }

    public static TiffTag Offsets(ushort number, int count) => new(number, 4, count, new byte[4 * count]);

    public static TiffTag Doubles(ushort number, double[] values)
    {
        byte[] bytes = new byte[8 * values.Length];
        for (int i = 0; i < values.Length; i++) BinaryPrimitives.WriteDoubleLittleEndian(bytes.AsSpan(8 * i), values[i]);
        return new TiffTag(number, 12, values.Length, bytes);
    }

    /// <summary>7-bit text with its closing zero; other letters become question marks.</summary>
    public static TiffTag Text(ushort number, string text)
    {
        byte[] bytes = [.. Encoding.ASCII.GetBytes(text), 0];
        return new TiffTag(number, 2, bytes.Length, bytes);
    }
}
