using System.Globalization;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Frame;
using static System.FormattableString;

namespace CloudStruct.Formats.Crs;

/// <summary>Coordinate systems as people write them in survey.yaml: "EPSG:32632", "EPSG:32632+5773", WKT, "local", "none".</summary>
public static class CrsText
{
    /// <summary>Parses a text.</summary>
    /// <param name="text">As typed; WKT may span lines.</param>
    /// <param name="where">What to name in a complaint, for example "survey.yaml, line 3".</param>
    /// <exception cref="InputException">The text is not understood.</exception>
    public static CrsInfo Parse(string text, string where = "survey.yaml: crs")
    {
        string t = text.Trim();
        if (t.Equals("none", StringComparison.OrdinalIgnoreCase)) return CrsInfo.None with { Source = "survey.yaml" };
        if (t.Equals("local", StringComparison.OrdinalIgnoreCase)) return new CrsInfo { Kind = CrsKind.Local, Name = "local", Source = "survey.yaml" };
        if (t.Contains('[', StringComparison.Ordinal))
        {
            try
            {
                CrsFound found = WktReader.Read(t);
                if (found.Crs.Kind == CrsKind.Unknown)
                    throw Fault(where, "the text names no horizontal coordinate system", found.Problems.FirstOrDefault() ?? t[..Math.Min(60, t.Length)]);
                return found.Crs with { Source = "survey.yaml" };
            }
            catch (FormatException e)
            {
                throw Fault(where, "the coordinate system text is not well-known text", e.Message);
            }
        }
        string[] parts = (t.StartsWith("EPSG:", StringComparison.OrdinalIgnoreCase) ? t[5..] : t).Split('+', StringSplitOptions.TrimEntries);
        if (parts.Length > 2 || !Number(parts[0], out int code) || code is < 1024 or > 999999)
            throw Fault(where, "the coordinate system is not understood", t.Length > 60 ? t[..60] + "..." : t);
        int vertical = 0;
        if (parts.Length == 2 && !Number(parts[1], out vertical))
            throw Fault(where, "the vertical part of the coordinate system is not understood", t);
        return OfCode(code, vertical);
    }

    private static CrsInfo OfCode(int code, int vertical)
    {
        CrsDraft d = EpsgRules.Find(code) ?? new CrsDraft
        {
            Kind = EpsgRules.IsGeographic(code) ? CrsKind.Geographic : CrsKind.Projected,
            Name = Invariant($"EPSG:{code}"), Epsg = code, HorizontalUnitM = EpsgRules.FeetOf(code) ?? 1,
        };
        d.Source = "survey.yaml";
        if (vertical > 0)
        {
            d.VerticalName = Invariant($"EPSG:{vertical}");
            d.VerticalUnitM = vertical switch { 6360 => Units.UsFootM, 8228 => Units.FootM, _ => 1 };
        }
        return d.Done();
    }

    private static bool Number(string text, out int value)
    {
        string bare = text.StartsWith("EPSG:", StringComparison.OrdinalIgnoreCase) ? text[5..] : text;
        return int.TryParse(bare, NumberStyles.None, CultureInfo.InvariantCulture, out value);
    }

    private static InputException Fault(string where, string what, string found) =>
        new(where, what, found, "Write EPSG:32632 or the like, a WKT text, local, or none");
}
