using System.Buffers.Binary;
using System.Globalization;
using System.Text;

namespace CloudStruct.Tests.Formats.Ply;

/// <summary>PLY files put together from Turk 1994: a header and records of values, in any of the three encodings.</summary>
internal sealed class PlyText
{
    private readonly StringBuilder header = new();
    private readonly MemoryStream data = new();
    private readonly string format;
    private readonly string newline;

    public PlyText(string format, string newline = "\n")
    {
        this.format = format;
        this.newline = newline;
        header.Append("ply").Append(newline).Append("format ").Append(format).Append(" 1.0").Append(newline);
    }

    public PlyText Line(string line)
    {
        header.Append(line).Append(newline);
        return this;
    }

    /// <summary>One record: values with the names of their types, in both naming styles.</summary>
    public PlyText Record(params ReadOnlySpan<(string Type, double Value)> values)
    {
        if (format == "ascii")
        {
            var parts = new List<string>();
            foreach ((string type, double value) in values)
                parts.Add(type is "float" or "float32" ? ((float)value).ToString("R", CultureInfo.InvariantCulture) : value.ToString("R", CultureInfo.InvariantCulture));
            data.Write(Encoding.ASCII.GetBytes(string.Join(' ', parts) + newline));
            return this;
        }
        foreach ((string type, double value) in values) data.Write(Bytes(type, value, format == "binary_big_endian"));
        return this;
    }

    public byte[] Make() => [.. Encoding.ASCII.GetBytes(header + "end_header" + newline), .. data.ToArray()];

    private static byte[] Bytes(string type, double value, bool big)
    {
        byte[] b = new byte[type switch { "char" or "int8" or "uchar" or "uint8" => 1, "short" or "int16" or "ushort" or "uint16" => 2, "double" or "float64" => 8, _ => 4 }];
        switch (type)
        {
            case "char" or "int8": b[0] = unchecked((byte)(sbyte)value); break;
            case "uchar" or "uint8": b[0] = (byte)value; break;
            case "short" or "int16": BinaryPrimitives.WriteInt16LittleEndian(b, (short)value); break;
            case "ushort" or "uint16": BinaryPrimitives.WriteUInt16LittleEndian(b, (ushort)value); break;
            case "int" or "int32": BinaryPrimitives.WriteInt32LittleEndian(b, (int)value); break;
            case "uint" or "uint32": BinaryPrimitives.WriteUInt32LittleEndian(b, (uint)value); break;
            case "float" or "float32": BinaryPrimitives.WriteSingleLittleEndian(b, (float)value); break;
            default: BinaryPrimitives.WriteDoubleLittleEndian(b, value); break;
        }
        if (big) Array.Reverse(b);
        return b;
    }
}
