using CloudStruct.Formats.Tables;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Complaints;
using static System.FormattableString;

namespace CloudStruct.Formats;

/// <summary>Attitudes of any table, in any of the ways in which people write them.</summary>
public static class AttitudeTable
{
    /// <summary>Reads all rows that hold an attitude.</summary>
    /// <param name="path">The table.</param>
    /// <param name="notation">How two numbers in one cell are meant: "strike/dip" or "dip direction/dip".</param>
    /// <param name="by">Column whose words make groups; null for none.</param>
    /// <returns>Attitude, group (empty without one), and area of rows that have area_m2 (else 0).</returns>
    /// <exception cref="InputException">No columns of an attitude, an attitude that is ambiguous, or no row.</exception>
    public static (Attitude Attitude, string Group, double AreaM2)[] Read(string path, string? notation, string? by)
    {
        Table table = TableReader.Read(path);
        if (!AttitudeCells.Has(table))
        {
            throw new InputException(Invariant($"{table.Name}, line 1"), "the table has no columns of an attitude", "columns " + string.Join(", ", table.Columns.Take(20)),
                "Give the columns " + AttitudeCells.Needed);
        }

        if (by is not null) table.Need(by);
        var rows = new List<(Attitude, string, double)>();
        for (int i = 0; i < table.Count; i++)
        {
            // Rows that state only a direction leave their attitude empty: contact rows, stations without a dip.
            if (Empty(table, i)) continue;
            rows.Add((AttitudeCells.Read(table, i, notation), by is null ? "" : table.Text(i, by), table.NumberOrNull(i, "area_m2") ?? 0));
        }

        return rows.Count > 0 ? [.. rows] : throw new InputException(table.Name, "no row holds an attitude", Invariant($"{table.Count} rows"), "Fill in the attitudes");
    }

    private static bool Empty(Table table, int row)
    {
        foreach (string column in (ReadOnlySpan<string>)["strike_deg", "dip_deg", "dip_direction_deg", "pole_trend_deg", "pole_plunge_deg", "attitude"])
        {
            if (table.Text(row, column).Length > 0) return false;
        }

        return true;
    }
}
