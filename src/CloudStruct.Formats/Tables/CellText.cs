using System.Globalization;
using System.Text.Json;
using static System.FormattableString;

namespace CloudStruct.Formats.Tables;

/// <summary>Text of one table cell, invariant: the digits that the column's kind asks for.</summary>
public static class CellText
{
    private static readonly CultureInfo Invariant0 = CultureInfo.InvariantCulture;

    /// <summary>Text of a value; empty for null, NaN and infinity.</summary>
    /// <exception cref="ArgumentException">The value does not fit the kind.</exception>
    public static string Of(CsvKind kind, object? value)
    {
        switch (value)
        {
            case null: return "";
            case string s: return s;
            case bool b: return b ? "yes" : "no";
            case Enum e: return JsonNamingPolicy.SnakeCaseLower.ConvertName(e.ToString());
        }
        switch (kind)
        {
            case CsvKind.Text:
                return Convert.ToString(value, Invariant0) ?? "";
            case CsvKind.Integer:
                if (value is double or float or decimal)
                {
                    double d = Convert.ToDouble(value, Invariant0);
                    return double.IsFinite(d) ? d.ToString("F0", Invariant0) : "";
                }
                return Convert.ToString(value, Invariant0) ?? "";
            case CsvKind.YesNo:
                throw new ArgumentException(Invariant($"yes or no was expected, not {value}"));
            default:
                double number = Convert.ToDouble(value, Invariant0);
                return double.IsFinite(number) ? Number(kind, number) : "";
        }
    }

    /// <summary>A number rounded to 4 significant digits, without an exponent between 1e-6 and 1e15.</summary>
    public static string FourDigits(double value)
    {
        if (value == 0) return "0";
        double size = Math.Abs(value);
        if (size is < 1e-6 or >= 1e15) return value.ToString("0.###E+0", Invariant0);
        // The exponent is taken after rounding: 9.9996 has one digit fewer behind the point than 9.999.
        string scientific = value.ToString("E3", Invariant0);
        int exponent = int.Parse(scientific.AsSpan(scientific.IndexOf('E') + 1), NumberStyles.AllowLeadingSign, Invariant0);
        return decimal.Parse(scientific, NumberStyles.Float, Invariant0).ToString($"F{Math.Max(0, 3 - exponent)}", Invariant0);
    }

    private static string Number(CsvKind kind, double value) => kind switch
    {
        CsvKind.AngleDeg => Fixed(value, 2),
        CsvKind.AzimuthDeg => Wrapped(value, 360),
        CsvKind.AxisDeg => Wrapped(value, 180),
        CsvKind.Metres => Fixed(value, 3),
        CsvKind.Number => FourDigits(value),
        _ => value.ToString("R", Invariant0),
    };

    private static string Wrapped(double value, double full)
    {
        double rest = Math.Round(value - (full * Math.Floor(value / full)), 2);
        return Fixed(rest >= full ? 0 : rest, 2);
    }

    // A small negative number rounds to "-0.00", which some readers take for text.
    private static string Fixed(double value, int decimals)
    {
        string text = value.ToString(decimals == 2 ? "F2" : "F3", Invariant0);
        return text.AsSpan().IndexOfAnyExcept("-0.") < 0 ? text.TrimStart('-') : text;
    }
}
