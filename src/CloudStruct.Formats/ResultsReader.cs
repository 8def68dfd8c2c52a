using System.Globalization;
using System.Text.Json;
using CloudStruct.Formats.Tables;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Comparing;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Frame;

namespace CloudStruct.Formats;

/// <summary>Reads run.json and the tables of a results folder back.</summary>
public static class ResultsReader
{
    /// <summary>Reads a results folder, or the folder of a survey that holds one.</summary>
    /// <exception cref="InputException">It holds no results of ours, or a table cannot be read.</exception>
    public static MeasuredResults Read(string folder)
    {
        string name = Path.GetFileName(Path.TrimEndingDirectorySeparator(Path.GetFullPath(folder)));
        string place = File.Exists(Path.Combine(folder, "run.json")) ? folder : Path.Combine(folder, "results");
        string record = Path.Combine(place, "run.json");
        if (!File.Exists(record))
            throw new InputException(name, "the folder holds no results", "no run.json in it, nor in a folder 'results' of it", "Name a folder that 'measure' wrote");
        MeasuredResults head = Head(record, name);
        return head with
        {
            Faces = [.. Faces(Path.Combine(place, "tables", "faces.csv"), head.TurnDeg)],
            Contacts = [.. Contacts(Path.Combine(place, "tables", "contacts.csv"), head.TurnDeg)],
            Widths = [.. Widths(Path.Combine(place, "tables", "width.csv"))],
        };
    }

    /// <summary>The folder in which the tables lie.</summary>
    public static string PlaceOf(string folder) => File.Exists(Path.Combine(folder, "run.json")) ? folder : Path.Combine(folder, "results");

    private static MeasuredResults Head(string record, string name)
    {
        try
        {
            using JsonDocument json = JsonDocument.Parse(File.ReadAllBytes(record));
            JsonElement root = json.RootElement;
            return new MeasuredResults
            {
                Survey = root.GetProperty("survey").GetString() ?? "",
                RunId = root.GetProperty("run_id").GetString() ?? "",
                North = root.GetProperty("north").GetString() switch { "true" => North.True, "grid" => North.Grid, _ => North.Model },
                ConvergenceDeg = root.GetProperty("convergence_deg") is { ValueKind: JsonValueKind.Number } c ? c.GetDouble() : null,
                Crs = root.GetProperty("crs").GetProperty("name").GetString() ?? "",
            };
        }
        catch (Exception e) when (e is JsonException or KeyNotFoundException or InvalidOperationException)
        {
            throw new InputException(name + ", run.json", "the record of the run cannot be read", "no valid record of ours", "Run 'measure' again", e);
        }
    }

    private static IEnumerable<MeasuredPlane> Faces(string path, double turnDeg)
    {
        Table t = TableReader.Read(path);
        t.Need("face_id", "x_m", "y_m", "z_m", "strike_deg", "dip_deg", "ellipse95_major_deg", "ellipse95_minor_deg", "ellipse95_rake_deg", "area_m2", "length_m", "height_m", "cone95_total_deg", "in_place");
        for (int i = 0; i < t.Count; i++)
        {
            if (t.Text(i, "in_place") == "no") continue;
            yield return new MeasuredPlane(
                t.Text(i, "face_id"), t.Text(i, "set"), Place(t, i), Normal(t, i, turnDeg), t.Number(i, "length_m"), t.Number(i, "height_m"), t.Number(i, "area_m2"),
                t.Number(i, "ellipse95_major_deg"), t.Number(i, "ellipse95_minor_deg"), t.Number(i, "ellipse95_rake_deg"), t.Number(i, "cone95_total_deg"));
        }
    }

    private static IEnumerable<MeasuredPlane> Contacts(string path, double turnDeg)
    {
        Table t = TableReader.Read(path);
        t.Need("dike", "margin", "segment", "chainage_from_m", "chainage_to_m", "x_m", "y_m", "z_m", "strike_deg", "dip_deg", "constraint", "cone95_total_deg", "ellipse95_major_deg");
        for (int i = 0; i < t.Count; i++)
        {
            if (t.Text(i, "constraint") != "plane" || t.NumberOrNull(i, "ellipse95_major_deg") is not { } major) continue;
            string margin = string.Create(CultureInfo.InvariantCulture, $"dike {t.Text(i, "dike")} {t.Text(i, "margin")}");
            yield return new MeasuredPlane(
                margin + " " + t.Text(i, "segment"), margin, Place(t, i), Normal(t, i, turnDeg), t.Number(i, "chainage_to_m") - t.Number(i, "chainage_from_m"), t.NumberOrNull(i, "relief_m") ?? 0, 0,
                major, t.Number(i, "ellipse95_minor_deg"), t.Number(i, "ellipse95_rake_deg"), t.Number(i, "cone95_total_deg"));
        }
    }

    private static IEnumerable<MeasuredWidth> Widths(string path)
    {
        Table t = TableReader.Read(path);
        t.Need("dike", "station", "x_m", "y_m", "z_m", "true_width_m", "true_width_low95_m", "true_width_high95_m", "status");
        for (int i = 0; i < t.Count; i++)
        {
            if (t.Text(i, "status") != "measured") continue;
            yield return new MeasuredWidth(
                string.Create(CultureInfo.InvariantCulture, $"dike {t.Text(i, "dike")} station {t.Text(i, "station")}"), Place(t, i),
                t.Number(i, "true_width_m"), t.Number(i, "true_width_low95_m"), t.Number(i, "true_width_high95_m"));
        }
    }

    private static Vec3 Place(Table t, int row) => new(t.Number(row, "x_m"), t.Number(row, "y_m"), t.Number(row, "z_m"));

    private static Vec3 Normal(Table t, int row, double turnDeg) => new Attitude(t.Number(row, "strike_deg"), t.Number(row, "dip_deg")).UpwardNormal(turnDeg);
}
