namespace CloudStruct.Formats.Crs;

/// <summary>Units of length and angle by name and by EPSG code.</summary>
/// <remarks>International foot 0.3048 m exactly; US survey foot 1200/3937 m exactly (US metric law of 1893).</remarks>
internal static class Units
{
    /// <summary>Metres in an international foot.</summary>
    public const double FootM = 0.3048;

    /// <summary>Metres in a US survey foot.</summary>
    public const double UsFootM = 1200.0 / 3937.0;

    /// <summary>Metres of a linear unit's EPSG code; null for codes that are not known.</summary>
    public static double? MetresOf(int code) => code switch
    {
        9001 => 1,
        9002 => FootM,
        9003 => UsFootM,
        9005 => 0.3047972654,              // Clarke's foot
        9036 => 1000,
        9037 => 0.9143917962,              // Clarke's yard
        9084 => 0.3047994715386762,        // Sears 1922 foot, from its yard of 0.914398... m
        9094 => 0.304799710181508820,      // Gold Coast foot
        _ => null,
    };

    /// <summary>Metres of a unit by name, for texts and citations; null when the name says nothing.</summary>
    public static double? MetresOf(string name)
    {
        string n = name.ToLowerInvariant().Replace('_', ' ').Replace('-', ' ');
        bool foot = n.Contains("foot", StringComparison.Ordinal) || n.Contains("feet", StringComparison.Ordinal) || n.Contains("ftus", StringComparison.Ordinal)
            || n.Contains("(ft)", StringComparison.Ordinal) || n.Trim() == "ft" || n.Contains("us ft", StringComparison.Ordinal);
        if (!foot) return n.Trim() is "metre" or "meter" or "metres" or "meters" or "m" ? 1 : null;
        if (n.Contains("clarke", StringComparison.Ordinal) || n.Contains("sears", StringComparison.Ordinal) || n.Contains("indian", StringComparison.Ordinal)
            || n.Contains("gold coast", StringComparison.Ordinal)) return null;
        bool us = n.Contains("us", StringComparison.Ordinal) || n.Contains("survey", StringComparison.Ordinal) || n.Contains("u.s.", StringComparison.Ordinal);
        return us ? UsFootM : FootM;
    }

    /// <summary>Degrees of an angular unit's EPSG code; null for codes that are not known.</summary>
    public static double? DegreesOf(int code) => code switch
    {
        9101 => 180 / Math.PI,
        9102 or 9122 => 1,
        9105 or 9106 => 0.9,               // grad, gon
        _ => null,
    };
}
