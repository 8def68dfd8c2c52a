using System.Globalization;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Field;
using CloudStruct.Records.Frame;
using static System.FormattableString;

namespace CloudStruct.Formats.Tables;

/// <summary>Compass readings: id, x_m, y_m, z_m, sigma_m, kind, an attitude, north, declination_deg, date, observer, use.</summary>
internal static class ReadingTable
{
    /// <summary>Reads all rows; magnetic azimuths come out as true ones.</summary>
    /// <param name="path">The table.</param>
    /// <param name="declination">Declination [deg] for a place, the row's own day and its name in complaints.</param>
    /// <param name="notation">How two numbers in a text are meant, where the survey says it.</param>
    /// <exception cref="Records.Complaints.InputException">A column, number or word is missing, wrong or ambiguous, or an id stands twice.</exception>
    public static FieldReading[] Read(string path, Func<Vec3, DateOnly?, string, double> declination, string? notation)
    {
        Table table = TableReader.Read(path);
        table.Need("id", "x_m", "y_m", "kind");
        if (!AttitudeCells.Has(table)) table.Need("strike_deg", "dip_deg");
        var seen = new HashSet<string>(StringComparer.Ordinal);
        var readings = new FieldReading[table.Count];
        for (int i = 0; i < readings.Length; i++)
        {
            string id = table.Text(i, "id");
            if (id.Length == 0) throw table.Fault(i, "id", "a reading has no id", "an empty cell", "Give each reading a name");
            if (!seen.Add(id)) throw table.Fault(i, "id", "an id stands twice", id, "Give each reading a name of its own");
            var place = new Vec3(table.Number(i, "x_m"), table.Number(i, "y_m"), table.NumberOrNull(i, "z_m") ?? double.NaN);
            double sigma = table.NumberOrNull(i, "sigma_m") ?? 0;
            if (sigma < 0) throw table.Fault(i, "sigma_m", "a sigma is negative", table.Text(i, "sigma_m"), "Correct the cell");
            ReadingKind kind = table.Text(i, "kind").ToLowerInvariant() switch
            {
                "face" => ReadingKind.Face,
                "contact" => ReadingKind.Contact,
                string other => throw table.Fault(i, "kind", "the kind is neither face nor contact", other, "Correct the word"),
            };
            ReadingUse use = table.Text(i, "use").ToLowerInvariant() switch
            {
                "check" or "" => ReadingUse.Check,   // claims less
                "prior" => ReadingUse.Prior,
                string other => throw table.Fault(i, "use", "the use is neither check nor prior", other, "Correct the word"),
            };
            (Attitude attitude, bool isTrue) = FromNorth(table, i, AttitudeCells.Read(table, i, notation), place, declination);
            readings[i] = new FieldReading(id, place, sigma, kind, attitude, isTrue, use);
        }

        return readings;
    }

    private static (Attitude Attitude, bool FromTrueNorth) FromNorth(Table table, int row, Attitude read, Vec3 place, Func<Vec3, DateOnly?, string, double> declination)
    {
        string north = table.Text(row, "north").ToLowerInvariant();
        if (north is "true" or "grid") return (read, north == "true");
        if (north.Length == 0) throw table.Fault(row, "north", "the north of an azimuth is not stated", "an empty cell", "Write true, grid or magnetic");
        if (north != "magnetic") throw table.Fault(row, "north", "the north is not true, grid or magnetic", north, "Correct the word");
        double east = table.NumberOrNull(row, "declination_deg") ?? declination(place, Day(table, row), Invariant($"{table.Name}, line {table.Line(row)}"));
        return (read with { StrikeDeg = Azimuth.Wrap360(read.StrikeDeg + east) }, true);
    }

    private static DateOnly? Day(Table table, int row)
    {
        string text = table.Text(row, "date");
        if (text.Length == 0) return null;
        return DateOnly.TryParseExact(text, "yyyy-MM-dd", CultureInfo.InvariantCulture, DateTimeStyles.None, out DateOnly day)
            ? day
            : throw table.Fault(row, "date", "a date is not understood", text, "Write the day as 2026-05-31");
    }
}
