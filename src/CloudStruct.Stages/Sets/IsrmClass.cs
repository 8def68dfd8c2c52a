namespace CloudStruct.Stages.Sets;

/// <summary>Class words of ISRM 1978 that follow from geometry alone.</summary>
/// <remarks>ISRM 1978, Suggested methods for the quantitative description of discontinuities, IJRMMS 15, 319-368, as tabulated in
/// Brady and Brown, Rock Mechanics for Underground Mining, tables 3.1 and 3.2. A value on a boundary belongs to the upper class:
/// the source leaves that open.</remarks>
public static class IsrmClass
{
    private static readonly (double FromM, string Word)[] Spacings =
    [
        (0, "extremely_close"), (0.02, "very_close"), (0.06, "close"), (0.2, "moderate"), (0.6, "wide"), (2, "very_wide"), (6, "extremely_wide"),
    ];

    private static readonly (double FromM, string Word)[] Persistences =
    [
        (0, "very_low"), (1, "low"), (3, "medium"), (10, "high"), (20, "very_high"),
    ];

    /// <summary>Class of a mean spacing; empty when it is not known.</summary>
    public static string OfSpacing(double? metres) => Of(Spacings, metres);

    /// <summary>Class of a persistence; empty when it is not known.</summary>
    public static string OfPersistence(double? metres) => Of(Persistences, metres);

    private static string Of((double FromM, string Word)[] classes, double? metres) =>
        metres is { } m && double.IsFinite(m) && m >= 0 ? classes.Last(c => m >= c.FromM).Word : "";
}
