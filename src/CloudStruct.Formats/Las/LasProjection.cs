namespace CloudStruct.Formats.Las;

/// <summary>Coordinate system of a LAS file as raw content of its records; what is absent is empty.</summary>
/// <param name="SaysWkt">Global encoding bit 4: WKT rules.</param>
/// <param name="Wkt">Text of record 2112.</param>
/// <param name="KeyDirectory">Record 34735: the GeoTIFF keys.</param>
/// <param name="KeyDoubles">Record 34736: their doubles.</param>
/// <param name="KeyText">Record 34737: their text.</param>
internal sealed record LasProjection(bool SaysWkt, string Wkt, byte[] KeyDirectory, byte[] KeyDoubles, byte[] KeyText)
{
    /// <summary>Nothing stated.</summary>
    public static LasProjection None { get; } = new(false, "", [], [], []);
}
