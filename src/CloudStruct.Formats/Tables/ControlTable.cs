using CloudStruct.Records.Complaints;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Formats.Tables;

/// <summary>Control and check points: id, x_m, y_m, z_m, model_x_m, model_y_m, model_z_m, sigma_h_m, sigma_v_m, role.</summary>
internal static class ControlTable
{
    /// <summary>Reads all rows. Sigmas that are not given are 0; a role that is not given is check, which claims less.</summary>
    /// <exception cref="InputException">A column, number or word is missing or wrong, or an id stands twice.</exception>
    public static ControlPoint[] Read(string path)
    {
        Table table = TableReader.Read(path);
        table.Need("id", "x_m", "y_m", "z_m");
        var seen = new HashSet<string>();
        var points = new ControlPoint[table.Count];
        for (int i = 0; i < points.Length; i++)
        {
            string id = table.Text(i, "id");
            if (id.Length == 0) throw table.Fault(i, "id", "a point has no id", "an empty cell", "Give each point a name");
            if (!seen.Add(id)) throw table.Fault(i, "id", "an id stands twice", id, "Give each point a name of its own");
            points[i] = new ControlPoint(id, new Vec3(table.Number(i, "x_m"), table.Number(i, "y_m"), table.Number(i, "z_m")),
                Model(table, i), Sigma(table, i, "sigma_h_m"), Sigma(table, i, "sigma_v_m"), IsCheck(table, i));
        }
        return points;
    }

    private static Vec3? Model(Table table, int row)
    {
        double? x = table.NumberOrNull(row, "model_x_m"), y = table.NumberOrNull(row, "model_y_m"), z = table.NumberOrNull(row, "model_z_m");
        if (x == null && y == null && z == null) return null;
        if (x == null || y == null || z == null)
            throw table.Fault(row, "model_x_m", "the place in the model is incomplete", $"{x} {y} {z}", "Give all three model coordinates or none");
        return new Vec3(x.Value, y.Value, z.Value);
    }

    private static double Sigma(Table table, int row, string column)
    {
        double sigma = table.NumberOrNull(row, column) ?? 0;
        return sigma >= 0 ? sigma : throw table.Fault(row, column, "a sigma is negative", table.Text(row, column), "Correct the cell");
    }

    private static bool IsCheck(Table table, int row) => table.Text(row, "role").ToLowerInvariant() switch
    {
        "control" => false,
        "check" or "" => true,
        string other => throw table.Fault(row, "role", "the role is neither control nor check", other, "Correct the word"),
    };
}
