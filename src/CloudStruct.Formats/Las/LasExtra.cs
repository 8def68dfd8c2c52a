namespace CloudStruct.Formats.Las;

/// <summary>One column of our own beyond the standard ones, stored as LAS extra bytes.</summary>
/// <param name="Name">Column name, at most 32 bytes of UTF-8: "face_id".</param>
/// <param name="Type">How a value is stored.</param>
/// <param name="Description">What it is, at most 32 bytes of UTF-8; longer text is cut.</param>
public sealed record LasExtra(string Name, LasExtraType Type, string Description)
{
    /// <summary>Bytes of one value; 0 for undocumented bytes, whose number the descriptor keeps elsewhere.</summary>
    public int Bytes => BytesOf(Type);

    /// <summary>Bytes of one value of a type.</summary>
    public static int BytesOf(LasExtraType type) => type switch
    {
        LasExtraType.UInt8 or LasExtraType.Int8 => 1,
        LasExtraType.UInt16 or LasExtraType.Int16 => 2,
        LasExtraType.UInt32 or LasExtraType.Int32 or LasExtraType.Float32 => 4,
        LasExtraType.UInt64 or LasExtraType.Int64 or LasExtraType.Float64 => 8,
        _ => 0,
    };
}
