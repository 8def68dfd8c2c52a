namespace CloudStruct.Formats.Ply;

/// <summary>Scalar types of PLY, under both naming styles (char and int8, ...).</summary>
internal enum PlyType : byte
{
    /// <summary>char, int8.</summary>
    Int8,

    /// <summary>uchar, uint8.</summary>
    UInt8,

    /// <summary>short, int16.</summary>
    Int16,

    /// <summary>ushort, uint16.</summary>
    UInt16,

    /// <summary>int, int32.</summary>
    Int32,

    /// <summary>uint, uint32.</summary>
    UInt32,

    /// <summary>float, float32.</summary>
    Float32,

    /// <summary>double, float64.</summary>
    Float64,
}
