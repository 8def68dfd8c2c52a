using CloudStruct.Records.Classes;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Frame;

namespace CloudStruct.Formats.Tables;

/// <summary>Hand labels as points: x_m, y_m, z_m, class, use (train when the column is missing or empty).</summary>
internal static class LabelTable
{
    /// <summary>Reads all rows.</summary>
    /// <exception cref="InputException">A column, number or word is missing or wrong.</exception>
    public static LabelPoint[] Read(string path)
    {
        Table table = TableReader.Read(path);
        table.Need("x_m", "y_m", "z_m", "class");
        var points = new LabelPoint[table.Count];
        for (int i = 0; i < points.Length; i++)
        {
            string rock = table.Text(i, "class"), use = table.Text(i, "use");
            (RockClass Class, LabelUse Use) label = LabelWords.Both(rock, use, out string fault);
            if (fault.Length > 0)
                throw table.Fault(i, fault.Contains("use", StringComparison.Ordinal) ? "use" : "class", fault, $"class {rock}, use {use}", "Correct the word");
            points[i] = new LabelPoint(new Vec3(table.Number(i, "x_m"), table.Number(i, "y_m"), table.Number(i, "z_m")), label.Class, label.Use);
        }
        return points;
    }
}
