namespace CloudStruct.Formats.Las;

/// <summary>Where things stand in the point records of LAS.</summary>
/// <remarks>LAS 1.4 R16, tables of point data record formats 0 to 10.</remarks>
internal static class LasRecord
{
    /// <summary>Highest point format of the standard.</summary>
    public const int LastFormat = 10;

    private static readonly int[] Minimum = [20, 28, 26, 34, 57, 63, 30, 36, 38, 59, 67];

    /// <summary>Least bytes of a record, formats 0 to 10.</summary>
    public static int MinimumBytes(int format) => Minimum[format];

    /// <summary>Byte at which red stands; -1 for formats without colour.</summary>
    public static int ColourOffset(int format) => format switch
    {
        2 => 20,
        3 or 5 => 28,
        7 or 8 or 10 => 30,
        _ => -1,
    };

    /// <summary>Flag of a deleted point: in byte 15, formats 0 to 5 (with the class) and 6 to 10 (with the other flags).</summary>
    public const int WithheldNarrow = 1 << 7, WithheldWide = 1 << 2;

    /// <summary>Formats 6 to 10 keep the class in a whole byte at 16, earlier ones in the low 5 bits of byte 15.</summary>
    public static bool HasWideClass(int format) => format >= 6;
}
