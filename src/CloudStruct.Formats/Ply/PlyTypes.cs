namespace CloudStruct.Formats.Ply;

/// <summary>Names and sizes of the scalar types.</summary>
/// <remarks>Turk 1994, The PLY polygon file format, and the sized names of later practice.</remarks>
internal static class PlyTypes
{
    /// <summary>Type of a name; null when there is no such type.</summary>
    public static PlyType? Parse(string name) => name switch
    {
        "char" or "int8" => PlyType.Int8,
        "uchar" or "uint8" => PlyType.UInt8,
        "short" or "int16" => PlyType.Int16,
        "ushort" or "uint16" => PlyType.UInt16,
        "int" or "int32" => PlyType.Int32,
        "uint" or "uint32" => PlyType.UInt32,
        "float" or "float32" => PlyType.Float32,
        "double" or "float64" => PlyType.Float64,
        _ => null,
    };

    /// <summary>Bytes of a value.</summary>
    public static int Bytes(PlyType type) => type switch
    {
        PlyType.Int8 or PlyType.UInt8 => 1,
        PlyType.Int16 or PlyType.UInt16 => 2,
        PlyType.Float64 => 8,
        _ => 4,
    };

    /// <summary>Whether values have a fractional part.</summary>
    public static bool IsFloat(PlyType type) => type is PlyType.Float32 or PlyType.Float64;
}
