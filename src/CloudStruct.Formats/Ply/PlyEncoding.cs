namespace CloudStruct.Formats.Ply;

/// <summary>How the values of a PLY file are stored.</summary>
internal enum PlyEncoding
{
    /// <summary>Text.</summary>
    Ascii,

    /// <summary>Binary, lowest byte first.</summary>
    LittleEndian,

    /// <summary>Binary, highest byte first.</summary>
    BigEndian,
}
