using System.Text.RegularExpressions;

namespace CloudStruct.Formats.Tables;

/// <summary>Whether a table writes its decimals with a point or a comma, told from all its cells together.</summary>
internal sealed partial class DecimalMark
{
    private readonly bool comma;

    private DecimalMark(bool comma, string? fault)
    {
        this.comma = comma;
        Fault = fault;
    }

    /// <summary>Why numbers with a comma cannot be read; null when they can.</summary>
    public string? Fault { get; }

    /// <summary>Looks at every cell.</summary>
    public static DecimalMark Of(string[][] rows)
    {
        bool points = false, commas = false, certain = false;
        foreach (string cell in rows.SelectMany(r => r))
        {
            if (PointNumber().IsMatch(cell)) points = true;
            if (!CommaNumber().IsMatch(cell)) continue;
            commas = true;
            certain |= !Thousands().IsMatch(cell);
        }
        if (commas && points) return new(false, "decimal points and commas are mixed");
        // 12,345 alone may be twelve thousand or twelve; one cell such as 0,5 or 612345,678 settles it for the table.
        if (commas && !certain) return new(false, "a comma may be a decimal mark or a separator of thousands");
        return new(commas, null);
    }

    /// <summary>The text with a decimal point.</summary>
    public string Plain(string text) => comma ? text.Replace(',', '.') : text;

    [GeneratedRegex(@"^[+-]?\d*\.\d+([eE][+-]?\d+)?$", RegexOptions.CultureInvariant)]
    private static partial Regex PointNumber();

    [GeneratedRegex(@"^[+-]?\d*,\d[\d,.]*([eE][+-]?\d+)?$", RegexOptions.CultureInvariant)]
    private static partial Regex CommaNumber();

    [GeneratedRegex(@"^[+-]?[1-9]\d{0,2}(,\d{3})+(\.\d+)?$", RegexOptions.CultureInvariant)]
    private static partial Regex Thousands();
}
