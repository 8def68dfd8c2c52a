using System.Globalization;
using System.Text.RegularExpressions;
using CloudStruct.Records.Attitudes;
using static System.FormattableString;

namespace CloudStruct.Formats.Tables;

/// <summary>The attitude of a row, in any of the ways in which people write one; one parser for all tables.</summary>
/// <remarks>
/// Columns: strike_deg and dip_deg (right-hand rule); dip_direction_deg and dip_deg; pole_trend_deg and pole_plunge_deg (downward pole);
/// or attitude, a text such as N35E/60SE. Two numbers in a text (065/40) can mean either, so that the survey's notation must say it.
/// </remarks>
internal static partial class AttitudeCells
{
    private static readonly string[] Points = ["N", "NNE", "NE", "ENE", "E", "ESE", "SE", "SSE", "S", "SSW", "SW", "WSW", "W", "WNW", "NW", "NNW"];

    /// <summary>Names of columns of which a table needs one pair, or the last alone.</summary>
    public const string Needed = "strike_deg and dip_deg, dip_direction_deg and dip_deg, pole_trend_deg and pole_plunge_deg, or attitude";

    /// <summary>Whether a table has columns for an attitude.</summary>
    public static bool Has(Table table) =>
        (table.Has("dip_deg") && (table.Has("strike_deg") || table.Has("dip_direction_deg"))) || (table.Has("pole_trend_deg") && table.Has("pole_plunge_deg")) || table.Has("attitude");

    /// <summary>Reads one.</summary>
    /// <param name="table">The table.</param>
    /// <param name="row">Row.</param>
    /// <param name="notation">"strike/dip" or "dip direction/dip" where the survey says it.</param>
    /// <exception cref="Records.Complaints.InputException">Missing, out of range, contradicting or ambiguous.</exception>
    public static Attitude Read(Table table, int row, string? notation)
    {
        if (table.Text(row, "attitude") is { Length: > 0 } text) return FromText(table, row, text, notation);
        if (table.NumberOrNull(row, "pole_trend_deg") is not null)
        {
            double trend = Within(table, row, "pole_trend_deg", 360), plunge = Within(table, row, "pole_plunge_deg", 90);
            return new Attitude(Azimuth.Wrap360(trend + 90), 90 - plunge);
        }

        double dip = Within(table, row, "dip_deg", 90);
        bool byStrike = table.Text(row, "strike_deg").Length > 0, byDirection = table.Text(row, "dip_direction_deg").Length > 0;
        if (!byStrike && !byDirection) throw table.Fault(row, "strike_deg", "the row has no strike and no dip direction", "empty cells", "Fill in one of them");
        double strike = byStrike ? Within(table, row, "strike_deg", 360) : Azimuth.Wrap360(Within(table, row, "dip_direction_deg", 360) - 90);
        if (byStrike && byDirection && Math.Abs(Azimuth.Wrap360(Within(table, row, "dip_direction_deg", 360) - 90 - strike + 180) - 180) > 1)
        {
            throw table.Fault(row, "strike_deg", "strike and dip direction contradict each other", Invariant($"{table.Text(row, "strike_deg")} and {table.Text(row, "dip_direction_deg")}"),
                "By the right-hand rule the dip direction is the strike plus 90; correct one of them or leave it out");
        }

        return new Attitude(Azimuth.Wrap360(strike), dip);
    }

    private static Attitude FromText(Table table, int row, string text, string? notation)
    {
        if (TwoNumbers().Match(text) is { Success: true } two)
        {
            double a = double.Parse(two.Groups[1].Value, CultureInfo.InvariantCulture), dip = double.Parse(two.Groups[2].Value, CultureInfo.InvariantCulture);
            if (a > 360 || dip > 90) throw table.Fault(row, "attitude", "an angle is out of range", text, "Azimuths go from 0 to 360, dips from 0 to 90");
            return notation switch
            {
                "strike/dip" => new Attitude(Azimuth.Wrap360(a), dip),
                "dip direction/dip" => new Attitude(Azimuth.Wrap360(a - 90), dip),
                _ => throw table.Fault(row, "attitude", "two numbers can be strike and dip or dip direction and dip", text, "Say it as notation in survey.yaml, or use the columns " + Needed),
            };
        }

        Match m = Quadrant().Match(text);
        if (!m.Success) throw table.Fault(row, "attitude", "an attitude is not understood", text, "Write N35E/60SE, or use the columns " + Needed);
        double angle = double.Parse(m.Groups[2].Value, CultureInfo.InvariantCulture), steep = double.Parse(m.Groups[4].Value, CultureInfo.InvariantCulture);
        if (angle > 90 || steep > 90) throw table.Fault(row, "attitude", "an angle is out of range", text, "Quadrant bearings and dips go from 0 to 90");
        bool north = char.ToUpperInvariant(m.Groups[1].Value[0]) == 'N', east = char.ToUpperInvariant(m.Groups[3].Value[0]) == 'E';
        double line = north ? (east ? angle : 360 - angle) : east ? 180 - angle : 180 + angle;
        if (m.Groups[5].Value.Length == 0)
        {
            return steep is 0 or 90 ? new Attitude(Azimuth.Wrap360(line), steep) : throw table.Fault(row, "attitude", "the side to which the plane dips is missing", text, "Add it: N35E/60SE");
        }

        double toward = Array.IndexOf(Points, m.Groups[5].Value.ToUpperInvariant()) * 22.5;
        double off = Math.Abs(Azimuth.Wrap360(toward - line - 90 + 180) - 180);
        // A side nearer to the strike than to the dip direction tells nothing.
        if (off is > 67.5 and < 112.5) throw table.Fault(row, "attitude", "the side to which the plane dips lies along its strike", text, "Name the side that is square to the strike");
        return new Attitude(Azimuth.Wrap360(off < 90 ? line : line + 180), steep);
    }

    private static double Within(Table table, int row, string column, double most)
    {
        double v = table.Number(row, column);
        return v >= 0 && v <= most ? v : throw table.Fault(row, column, "an angle is out of range", table.Text(row, column), Invariant($"It goes from 0 to {most}"));
    }

    [GeneratedRegex(@"^\s*(\d+(?:\.\d+)?)\s*[/ ]\s*(\d+(?:\.\d+)?)\s*$")]
    private static partial Regex TwoNumbers();

    [GeneratedRegex(@"^\s*([NSns])\s*(\d+(?:\.\d+)?)\s*([EWew])\s*[/, ]\s*(\d+(?:\.\d+)?)\s*((?:[NSns]{1,2}[NSEWnsew]{0,2}|[EWew][NSns]?[EWew]?)?)\s*$")]
    private static partial Regex Quadrant();
}
