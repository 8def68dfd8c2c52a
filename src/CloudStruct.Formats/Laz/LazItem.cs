namespace CloudStruct.Formats.Laz;

/// <summary>One item of the compression record.</summary>
/// <param name="Type">0 bytes, 6 point, 7 time, 8 colour, 9 wave packet; layered: 10 point, 11 colour, 12 colour and infrared, 13 wave packet, 14 bytes.</param>
/// <param name="Bytes">Size in the record.</param>
/// <param name="Version">Version of its stream.</param>
internal readonly record struct LazItem(int Type, int Bytes, int Version)
{
    /// <summary>Whether it belongs to the layered form.</summary>
    public bool IsLayered => Type >= 10;

    /// <summary>Whether type, size and version are ones that exist.</summary>
    public bool IsKnown => (Type, Bytes, Version) switch
    {
        (0, >= 1, 1 or 2) => true,
        (6, 20, 1 or 2) or (7, 8, 1 or 2) or (8, 6, 1 or 2) or (9, 29, 1) => true,
        (10, 30, >= 2 and <= 4) or (11, 6, >= 2 and <= 4) or (12, 8, >= 2 and <= 4) or (13, 29, >= 2 and <= 4) or (14, >= 1, >= 2 and <= 4) => true,
        _ => false,
    };
}
