using System.Globalization;
using CloudStruct.Formats.Bytes;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Complaints;
using Microsoft.Data.Sqlite;
using NetTopologySuite.Geometries;
using NetTopologySuite.IO;
using static System.FormattableString;

namespace CloudStruct.Formats.GeoPackage;

/// <summary>Hand labels drawn as polygons in a GeoPackage: every feature table with the columns class, use, z_min_m, z_max_m.</summary>
internal static class GeoPackageLabels
{
    /// <summary>Reads all feature tables that have a class column.</summary>
    /// <exception cref="InputException">The file is not a GeoPackage, or no table has labels.</exception>
    public static HandLabels Read(string path)
    {
        using (var file = new FileBytes(path))
        {
            Span<byte> start = stackalloc byte[16];
            if (file.Read(0, start) < 16 || !start.StartsWith("SQLite format 3"u8)) throw NotGeoPackage(file.Name, "another kind of file");
        }
        string name = Path.GetFileName(path);
        try
        {
            return Read(path, name);
        }
        catch (SqliteException e)
        {
            throw NotGeoPackage(name, e.Message, e);
        }
        catch (Exception e) when (e is InvalidOperationException or InvalidCastException)
        {
            throw NotGeoPackage(name, "a cell of another type than its column", e);
        }
    }

    private static HandLabels Read(string path, string name)
    {
        var polygons = new List<LabelPolygon>();
        var points = new List<LabelPoint>();
        // No pooling: the file must be free when the reading is over.
        using var connection = new SqliteConnection(new SqliteConnectionStringBuilder { DataSource = path, Mode = SqliteOpenMode.ReadOnly, Pooling = false }.ToString());
        connection.Open();
        int tables = 0;
        foreach ((string table, string column) in Layers(connection))
        {
            string[] columns = Columns(connection, table);
            if (!columns.Contains("class", StringComparer.OrdinalIgnoreCase)) continue;
            tables++;
            ReadLayer(connection, name, table, column, polygons, points);
        }
        if (tables == 0)
            throw new InputException(name, "the GeoPackage has no label layer", "no feature table with a column class", "Give the layer the columns class and use");
        return new HandLabels { Polygons = [.. polygons], Points = [.. points] };
    }

    private static void ReadLayer(
        SqliteConnection connection, string name, string table, string geometryColumn, List<LabelPolygon> polygons, List<LabelPoint> points)
    {
        using SqliteCommand command = connection.CreateCommand();
        command.CommandText = $"SELECT * FROM {Quoted(table)} ORDER BY rowid";
        using SqliteDataReader rows = command.ExecuteReader();
        var places = new Dictionary<string, int>(StringComparer.OrdinalIgnoreCase);
        for (int c = 0; c < rows.FieldCount; c++) places[rows.GetName(c)] = c;
        var parser = new GeoPackageGeoReader();
        int n = 0;
        while (rows.Read())
        {
            string where = Invariant($"{name}, layer {table}, feature {++n}");
            object? Value(string column) => places.TryGetValue(column, out int c) && !rows.IsDBNull(c) ? rows.GetValue(c) : null;
            string Text(string column) => Convert.ToString(Value(column), CultureInfo.InvariantCulture) ?? "";
            double? Number(string column) => Value(column) switch
            {
                null => null,
                double d => d,
                long l => l,
                object other => throw new InputException(where, Invariant($"{column} is not a number"), Convert.ToString(other, CultureInfo.InvariantCulture) ?? "", "Correct the cell"),
            };
            LabelShapes.Add(where, Shape(parser, Value(geometryColumn) as byte[], where), Text, Number, polygons, points);
        }
    }

    private static Geometry? Shape(GeoPackageGeoReader parser, byte[]? blob, string where)
    {
        if (blob == null) return null;
        try
        {
            return parser.Read(blob);
        }
        catch (Exception e) when (e is ParseException or IOException or ArgumentException or FormatException or OverflowException or IndexOutOfRangeException)
        {
            throw new InputException(where, "the geometry cannot be read", Invariant($"{blob.Length} bytes"), "Draw the feature again", e);
        }
    }

    private static List<(string Table, string Column)> Layers(SqliteConnection connection)
    {
        var layers = new List<(string, string)>();
        using SqliteCommand command = connection.CreateCommand();
        command.CommandText = "SELECT table_name, column_name FROM gpkg_geometry_columns ORDER BY table_name";
        using SqliteDataReader rows = command.ExecuteReader();
        while (rows.Read()) layers.Add((rows.GetString(0), rows.GetString(1)));
        return layers;
    }

    private static string[] Columns(SqliteConnection connection, string table)
    {
        using SqliteCommand command = connection.CreateCommand();
        command.CommandText = "SELECT name FROM pragma_table_info($table)";
        command.Parameters.AddWithValue("$table", table);
        using SqliteDataReader rows = command.ExecuteReader();
        var names = new List<string>();
        while (rows.Read()) names.Add(rows.GetString(0));
        return [.. names];
    }

    private static string Quoted(string identifier) => "\"" + identifier.Replace("\"", "\"\"", StringComparison.Ordinal) + "\"";

    private static InputException NotGeoPackage(string name, string found, Exception? inner = null) =>
        new(name, "the file is not a GeoPackage that can be read", found, "Export it again as GeoPackage, or as GeoJSON", inner);
}
