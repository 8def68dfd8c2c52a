namespace CloudStruct.Formats.Las;

/// <summary>Types of an extra-bytes column, numbered as in the LAS 1.4 extra bytes descriptor.</summary>
public enum LasExtraType : byte
{
    /// <summary>Bytes without a stated meaning.</summary>
    Undocumented = 0,

    /// <summary>Unsigned 8-bit: byte[].</summary>
    UInt8 = 1,

    /// <summary>Signed 8-bit: sbyte[].</summary>
    Int8 = 2,

    /// <summary>Unsigned 16-bit: ushort[].</summary>
    UInt16 = 3,

    /// <summary>Signed 16-bit: short[].</summary>
    Int16 = 4,

    /// <summary>Unsigned 32-bit: uint[].</summary>
    UInt32 = 5,

    /// <summary>Signed 32-bit: int[].</summary>
    Int32 = 6,

    /// <summary>Unsigned 64-bit: ulong[].</summary>
    UInt64 = 7,

    /// <summary>Signed 64-bit: long[].</summary>
    Int64 = 8,

    /// <summary>32-bit float: float[].</summary>
    Float32 = 9,

    /// <summary>64-bit float: double[].</summary>
    Float64 = 10,
}
