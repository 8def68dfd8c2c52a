using System.Buffers.Binary;

namespace CloudStruct.Formats.Ply;

/// <summary>One binary value as a double: exact for every type of PLY.</summary>
internal static class PlyValue
{
    /// <summary>Reads the value at the front of a span that is long enough.</summary>
    public static double Read(ReadOnlySpan<byte> s, PlyType type, bool bigEndian) => type switch
    {
        PlyType.Int8 => unchecked((sbyte)s[0]),
        PlyType.UInt8 => s[0],
        PlyType.Int16 => bigEndian ? BinaryPrimitives.ReadInt16BigEndian(s) : BinaryPrimitives.ReadInt16LittleEndian(s),
        PlyType.UInt16 => bigEndian ? BinaryPrimitives.ReadUInt16BigEndian(s) : BinaryPrimitives.ReadUInt16LittleEndian(s),
        PlyType.Int32 => bigEndian ? BinaryPrimitives.ReadInt32BigEndian(s) : BinaryPrimitives.ReadInt32LittleEndian(s),
        PlyType.UInt32 => bigEndian ? BinaryPrimitives.ReadUInt32BigEndian(s) : BinaryPrimitives.ReadUInt32LittleEndian(s),
        PlyType.Float32 => bigEndian ? BinaryPrimitives.ReadSingleBigEndian(s) : BinaryPrimitives.ReadSingleLittleEndian(s),
        _ => bigEndian ? BinaryPrimitives.ReadDoubleBigEndian(s) : BinaryPrimitives.ReadDoubleLittleEndian(s),
    };
}
