using System.Globalization;

namespace CloudStruct.Formats.Bytes;

/// <summary>Numbers written as text, invariant, with the spellings of not-a-number and infinity that C programs print.</summary>
internal static class AsciiNumber
{
    private static readonly double[] Tens =
    [
        1e0, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18, 1e19, 1e20, 1e21, 1e22,
    ];

    /// <summary>Parses a whole token.</summary>
    /// <returns>False when it is not a number.</returns>
    public static bool TryParse(ReadOnlySpan<byte> s, out double value)
    {
        if (TryPlain(s, out value)) return true;
        if (double.TryParse(s, NumberStyles.Float, CultureInfo.InvariantCulture, out value)) return true;
        bool negative = s.Length > 0 && s[0] == '-';
        ReadOnlySpan<byte> bare = s.Length > 0 && s[0] is (byte)'-' or (byte)'+' ? s[1..] : s;
        if (Is(bare, "inf"u8) || Is(bare, "infinity"u8) || Is(bare, "1.#INF"u8))
        {
            value = negative ? double.NegativeInfinity : double.PositiveInfinity;
            return true;
        }
        value = double.NaN;
        return Is(bare, "nan"u8) || Is(bare, "nan(ind)"u8) || Is(bare, "nan(snan)"u8) || Is(bare, "1.#QNAN"u8) || Is(bare, "1.#IND"u8);
    }

    /// <summary>Half a unit of the last digit of a number's text: 0.0005 for "1.234", 50 for "1e2".</summary>
    public static double HalfUnit(ReadOnlySpan<byte> s)
    {
        int e = s.IndexOfAny((byte)'e', (byte)'E');
        ReadOnlySpan<byte> mantissa = e < 0 ? s : s[..e];
        int point = mantissa.IndexOf((byte)'.');
        int exponent = point < 0 ? 0 : point + 1 - mantissa.Length;
        if (e >= 0 && int.TryParse(s[(e + 1)..], NumberStyles.AllowLeadingSign, CultureInfo.InvariantCulture, out int power)
            && Math.Abs(power) < 400) exponent += power;
        return 0.5 * Math.Pow(10, exponent);
    }

    // Sign, digits, point, digits. Up to 2^53 and 10^22 are exact doubles, so one division rounds once and correctly
    // (Clinger 1990, How to read floating point numbers accurately).
    private static bool TryPlain(ReadOnlySpan<byte> s, out double value)
    {
        value = 0;
        int i = 0;
        bool negative = false;
        if (s.Length > 0 && s[0] is (byte)'-' or (byte)'+') negative = s[i++] == '-';
        long digits = 0;
        int seen = 0, decimals = -1;
        for (; i < s.Length; i++)
        {
            byte c = s[i];
            if (c == '.' && decimals < 0)
            {
                decimals = 0;
                continue;
            }
            if (c is < (byte)'0' or > (byte)'9' || ++seen > 18) return false;
            digits = (digits * 10) + (c - '0');
            if (decimals >= 0) decimals++;
        }
        if (seen == 0 || digits > 1L << 53) return false;
        value = decimals > 0 ? digits / Tens[decimals] : digits;
        if (negative) value = -value;
        return true;
    }

    private static bool Is(ReadOnlySpan<byte> s, ReadOnlySpan<byte> word)
    {
        if (s.Length != word.Length) return false;
        for (int i = 0; i < s.Length; i++)
        {
            if (char.ToLowerInvariant((char)s[i]) != char.ToLowerInvariant((char)word[i])) return false;
        }
        return true;
    }
}
