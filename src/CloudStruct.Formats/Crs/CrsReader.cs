using CloudStruct.Records.Frame;
using static System.FormattableString;

namespace CloudStruct.Formats.Crs;

/// <summary>Coordinate system of a LAS file from its records, when text and keys are both there or one is unusable.</summary>
internal static class CrsReader
{
    /// <summary>What the records say.</summary>
    /// <param name="saysWkt">The header's bit that the text rules.</param>
    /// <param name="wkt">Text; empty when absent.</param>
    /// <param name="directory">GeoTIFF keys; empty when absent.</param>
    /// <param name="doubles">Their numbers.</param>
    /// <param name="text">Their text.</param>
    public static CrsFound Read(bool saysWkt, string wkt, byte[] directory, byte[] doubles, byte[] text)
    {
        CrsFound? byText = null, byKeys = null;
        var problems = new List<string>();
        if (wkt.Length > 0)
        {
            try
            {
                byText = WktReader.Read(wkt);
            }
            catch (FormatException e)
            {
                problems.Add(Invariant($"The coordinate system text cannot be understood ({e.Message}); it is ignored."));
            }
        }
        if (directory.Length > 0) byKeys = GeoKeysReader.Read(directory, doubles, text);
        bool textIsKnown = byText != null && byText.Crs.Kind != CrsKind.Unknown;
        bool keysAreKnown = byKeys != null && byKeys.Crs.Kind != CrsKind.Unknown;
        if (textIsKnown && keysAreKnown && byText!.Crs.Epsg > 0 && byKeys!.Crs.Epsg > 0 && byText.Crs.Epsg != byKeys.Crs.Epsg)
            problems.Add(Invariant($"The coordinate system is given twice and differs: EPSG:{byText.Crs.Epsg} as text, EPSG:{byKeys.Crs.Epsg} as keys. The {(saysWkt ? "text" : "keys")} are followed."));
        CrsFound? chosen = (textIsKnown, keysAreKnown) switch
        {
            (true, false) => byText,
            (false, true) => byKeys,
            (true, true) when saysWkt => byText,
            // Before LAS 1.4 the keys rule; the text is taken when it says the same and more.
            (true, true) => byKeys!.Crs.Epsg == byText!.Crs.Epsg && byKeys.Crs.Parameters.Length == 0 ? byText : byKeys,
            _ => byText ?? byKeys,
        };
        if (chosen != null) problems.AddRange(chosen.Problems);
        return new CrsFound(chosen?.Crs ?? CrsInfo.None, [.. problems]);
    }
}
