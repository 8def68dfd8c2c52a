using System.Globalization;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Decisions;
using CloudStruct.Records.Frame;
using static System.FormattableString;

namespace CloudStruct.Formats.Tables;

/// <summary>What a geologist decided: action, face_id, x_m, y_m, z_m, strike_deg, dip_deg, north, domain, set, other_set,
/// other_strike_deg, other_dip_deg, dike, margin, note, decided_by, decided_on. The report writes it; a text editor will do.</summary>
internal static class DecisionTable
{
    private const string Actions = "drop, domain, join_sets, split_set, confirm_contact, note";

    /// <summary>Reads all rows.</summary>
    /// <exception cref="InputException">A column, number or word is missing or wrong.</exception>
    public static Decision[] Read(string path)
    {
        Table table = TableReader.Read(path);
        table.Need("action");
        return [.. Enumerable.Range(0, table.Count).Select(i => Row(table, i))];
    }

    private static Decision Row(Table table, int row)
    {
        DecisionAction action = table.Text(row, "action").ToLowerInvariant() switch
        {
            "drop" => DecisionAction.Drop,
            "domain" => DecisionAction.Domain,
            "join_sets" => DecisionAction.JoinSets,
            "split_set" => DecisionAction.SplitSet,
            "confirm_contact" => DecisionAction.ConfirmContact,
            "note" => DecisionAction.Note,
            "" => throw table.Fault(row, "action", "a row says no action", "an empty cell", "Write one of " + Actions),
            string other => throw table.Fault(row, "action", "an action is not known", other, "Write one of " + Actions),
        };
        DecisionTarget target = Target(table, row, action);
        bool ofSets = target == DecisionTarget.Set;
        Attitude? attitude = Plane(table, row, "strike_deg", "dip_deg");
        Attitude? second = Plane(table, row, "other_strike_deg", "other_dip_deg");
        if (attitude is null && target is DecisionTarget.Face or DecisionTarget.Set) throw Missing(table, row, "strike_deg", "the attitude by which it is known again is missing");
        if (second is null && action is DecisionAction.JoinSets or DecisionAction.SplitSet) throw Missing(table, row, "other_strike_deg", "the second attitude is missing");
        string note = table.Text(row, "note");
        if (action == DecisionAction.Note && note.Length == 0) throw table.Fault(row, "note", "a note has no words", "an empty cell", "Write the note or remove the row");
        FaceDomain domain = Domain(table, row);
        if (domain == FaceDomain.Unknown && (action == DecisionAction.Domain || ofSets)) throw Missing(table, row, "domain", "the domain is missing");
        return new Decision
        {
            Line = table.Line(row),
            Action = action,
            Target = target,
            FaceId = Whole(table, row, "face_id"),
            Place = ofSets ? null : new Vec3(table.Number(row, "x_m"), table.Number(row, "y_m"), table.Number(row, "z_m")),
            Attitude = attitude,
            Other = second,
            North = NorthOf(table, row),
            Domain = domain,
            Set = table.Text(row, "set"),
            OtherSet = table.Text(row, "other_set"),
            Dike = Whole(table, row, "dike"),
            Margin = MarginOf(table, row),
            Note = note,
            By = table.Text(row, "decided_by"),
            On = Day(table, row),
        };
    }

    // A note says what it is about by what it carries: a side of a dike, else a place with an attitude (a face), else a set.
    private static DecisionTarget Target(Table table, int row, DecisionAction action) => action switch
    {
        DecisionAction.Drop or DecisionAction.Domain => DecisionTarget.Face,
        DecisionAction.JoinSets or DecisionAction.SplitSet => DecisionTarget.Set,
        DecisionAction.ConfirmContact => DecisionTarget.Contact,
        _ when table.Text(row, "margin").Length > 0 => DecisionTarget.Contact,
        _ when table.Text(row, "x_m").Length == 0 && table.Text(row, "set").Length > 0 => DecisionTarget.Set,
        _ when table.Text(row, "dip_deg").Length > 0 => DecisionTarget.Face,
        _ => DecisionTarget.Place,
    };

    private static Attitude? Plane(Table table, int row, string strike, string dip)
    {
        double? s = table.NumberOrNull(row, strike), d = table.NumberOrNull(row, dip);
        if (s is null && d is null) return null;
        if (s is null) throw Missing(table, row, strike, "a dip stands without its strike");
        if (d is null) throw Missing(table, row, dip, "a strike stands without its dip");
        if (s is < 0 or > 360) throw table.Fault(row, strike, "a strike is out of range", table.Text(row, strike), "Azimuths go from 0 to 360");
        if (d is < 0 or > 90) throw table.Fault(row, dip, "a dip is out of range", table.Text(row, dip), "Dips go from 0 to 90");
        return new Attitude(Azimuth.Wrap360(s.Value), d.Value);
    }

    private static FaceDomain Domain(Table table, int row) => table.Text(row, "domain").ToLowerInvariant() switch
    {
        "host" => FaceDomain.Host,
        "dike" => FaceDomain.Dike,
        "margin" => FaceDomain.Margin,
        "" => FaceDomain.Unknown,
        string other => throw table.Fault(row, "domain", "a domain is not known", other, "Write host, dike or margin"),
    };

    private static Margin? MarginOf(Table table, int row) => table.Text(row, "margin").ToUpperInvariant() switch
    {
        "A" => Margin.A,
        "B" => Margin.B,
        "" => null,
        string other => throw table.Fault(row, "margin", "a margin is neither A nor B", other, "Correct the cell"),
    };

    private static North? NorthOf(Table table, int row) => table.Text(row, "north").ToLowerInvariant() switch
    {
        "true" => North.True,
        "grid" => North.Grid,
        "model" => North.Model,
        "" => null,
        string other => throw table.Fault(row, "north", "the north is not true, grid or model", other, "Correct the word, or leave the cell empty for the north of the run"),
    };

    private static int Whole(Table table, int row, string column)
    {
        if (table.NumberOrNull(row, column) is not { } v) return 0;
        return v is >= 0 and <= int.MaxValue && v == Math.Floor(v) ? (int)v : throw table.Fault(row, column, "a whole number was expected", table.Text(row, column), "Correct the cell, or leave it empty");
    }

    private static string Day(Table table, int row)
    {
        string text = table.Text(row, "decided_on");
        return text.Length == 0 || DateOnly.TryParseExact(text, "yyyy-MM-dd", CultureInfo.InvariantCulture, DateTimeStyles.None, out _)
            ? text
            : throw table.Fault(row, "decided_on", "a date is not understood", text, "Write the day as 2026-05-31");
    }

    private static InputException Missing(Table table, int row, string column, string what) =>
        table.Fault(row, column, Invariant($"{what}"), "an empty cell", "Fill it in, or take the decision again in the report, which writes it");
}
