namespace CloudStruct.Formats.Laz;

/// <summary>Contexts by number of returns n and return number r.</summary>
internal static class ReturnTables
{
    private static readonly byte[] Narrow =
    [
        15, 14, 13, 12, 11, 10, 9, 8,
        14, 0, 1, 3, 6, 10, 10, 9,
        13, 1, 2, 4, 7, 11, 11, 10,
        12, 3, 4, 5, 8, 12, 12, 11,
        11, 6, 7, 8, 9, 13, 13, 12,
        10, 10, 11, 12, 13, 14, 14, 13,
        9, 10, 11, 12, 13, 14, 15, 14,
        8, 9, 10, 11, 12, 13, 14, 15,
    ];

    private static readonly byte[] Wide = Digits(
        "0123453445555555", "1013333333333333", "2124444444433333", "3345444444444444", "4344544444444444", "5344454444444444", "3344445444444444", "4344444544444444",
        "4344444454444444", "5344444445444444", "5344444444544444", "5334444444455444", "5334444444455544", "5334444444445554", "5334444444444555", "5334444444444455");

    /// <summary>Context of intensity and coordinates, point formats 0 to 5: 0 to 15.</summary>
    public static int NarrowMap(int n, int r) => Narrow[(8 * n) + r];

    /// <summary>Context of height, point formats 0 to 5: 0 to 7.</summary>
    public static int NarrowLevel(int n, int r) => Math.Abs(n - r);

    /// <summary>Context of coordinates, point formats 6 to 10: 0 to 5.</summary>
    public static int WideMap(int n, int r) => Wide[(16 * n) + r];

    /// <summary>Context of height, point formats 6 to 10: 0 to 7.</summary>
    public static int WideLevel(int n, int r) => Math.Min(Math.Abs(n - r), 7);

    /// <summary>Context from the bits of earlier differences: even and capped.</summary>
    public static int Even(int k, int cap) => k < cap ? k & ~1 : cap;

    private static byte[] Digits(params string[] rows) => [.. rows.SelectMany(r => r.Select(c => (byte)(c - '0')))];
}
