using System.Globalization;
using CloudStruct.Records.Frame;
using Microsoft.Data.Sqlite;
using static System.FormattableString;

namespace CloudStruct.Formats.GeoPackage;

/// <summary>Writes layers as a GeoPackage 1.3 (OGC 12-128r17), with styles in the conventional table layer_styles.</summary>
/// <remarks>The same layers give the same bytes: rows are inserted in order, and the only date is that of the input. Where
/// the system has no EPSG code it is written with its own text under a number of its own; without a system the shapes are
/// in undefined cartesian coordinates (-1), as the standard asks.</remarks>
public static class GeoPackageWriter
{
    // "GPKG" as a number, and version 1.3.0: clause 1.1.1.1.1 of the standard.
    private const int ApplicationId = 0x47504B47, Version = 10300;

    private const int OwnSystem = 100000;

    /// <summary>Writes a file.</summary>
    /// <param name="path">Where; an existing file is replaced.</param>
    /// <param name="layers">Layers in order.</param>
    /// <param name="crs">System of the vertices; not named when it is not in metres.</param>
    /// <param name="date">Date of the input; the epoch of 1970 when none is known.</param>
    public static void Write(string path, IReadOnlyList<GeoLayer> layers, CrsInfo crs, DateOnly? date)
    {
        File.Delete(path);
        string when = (date ?? new DateOnly(1970, 1, 1)).ToString("yyyy-MM-dd", CultureInfo.InvariantCulture) + "T00:00:00.000Z";
        using var db = new SqliteConnection(new SqliteConnectionStringBuilder { DataSource = path, Pooling = false }.ToString());
        db.Open();
        Run(db, Invariant($"PRAGMA page_size = 4096; PRAGMA journal_mode = MEMORY; PRAGMA application_id = {ApplicationId}; PRAGMA user_version = {Version};"));
        using SqliteTransaction all = db.BeginTransaction();
        Run(db, GeoPackageTables.Sql);
        int system = AddSystem(db, crs);
        foreach (GeoLayer layer in layers) AddLayer(db, layer, system, when);
        if (layers.Any(l => l.Sld.Length > 0)) AddStyles(db, layers, when);
        all.Commit();
    }

    private static int AddSystem(SqliteConnection db, CrsInfo crs)
    {
        bool named = crs.HorizontalUnitM == 1 && (crs.Wkt.Length > 0 || crs.Epsg > 0);
        if (!named || crs.Kind is CrsKind.Geographic) return -1;
        int number = crs.Epsg > 0 ? crs.Epsg : OwnSystem;
        if (number == 4326) return number;
        using SqliteCommand add = db.CreateCommand();
        add.CommandText = "INSERT INTO gpkg_spatial_ref_sys VALUES ($name, $id, $organization, $code, $text, 'of the survey')";
        add.Parameters.AddWithValue("$name", crs.Name.Length > 0 ? crs.Name : Invariant($"system {number}"));
        add.Parameters.AddWithValue("$id", number);
        add.Parameters.AddWithValue("$organization", crs.Epsg > 0 ? "EPSG" : "NONE");
        add.Parameters.AddWithValue("$code", number);
        add.Parameters.AddWithValue("$text", crs.Wkt.Length > 0 ? crs.Wkt : "undefined");
        add.ExecuteNonQuery();
        return number;
    }

    private static void AddLayer(SqliteConnection db, GeoLayer layer, int system, string when)
    {
        bool shapes = layer.Shape != GeoShape.None;
        string columns = string.Concat(layer.Columns.Select(c => Invariant($", \"{c.Name}\" {(c.IsInteger ? "INTEGER" : c.IsText ? "TEXT" : "REAL")}")));
        Run(db, Invariant($"CREATE TABLE \"{layer.Name}\" (fid INTEGER PRIMARY KEY AUTOINCREMENT NOT NULL{(shapes ? $", geom {GeoBlob.TypeName(layer.Shape)}" : "")}{columns})"));
        (double minX, double minY, double maxX, double maxY)? box = Box(layer);
        using (SqliteCommand contents = db.CreateCommand())
        {
            contents.CommandText = "INSERT INTO gpkg_contents VALUES ($t, $type, $t, $meaning, $when, $x0, $y0, $x1, $y1, $srs)";
            contents.Parameters.AddWithValue("$t", layer.Name);
            contents.Parameters.AddWithValue("$type", shapes ? "features" : "attributes");
            contents.Parameters.AddWithValue("$meaning", layer.Meaning);
            contents.Parameters.AddWithValue("$when", when);
            contents.Parameters.AddWithValue("$x0", (object?)box?.minX ?? DBNull.Value);
            contents.Parameters.AddWithValue("$y0", (object?)box?.minY ?? DBNull.Value);
            contents.Parameters.AddWithValue("$x1", (object?)box?.maxX ?? DBNull.Value);
            contents.Parameters.AddWithValue("$y1", (object?)box?.maxY ?? DBNull.Value);
            contents.Parameters.AddWithValue("$srs", shapes ? system : DBNull.Value);
            contents.ExecuteNonQuery();
        }

        if (shapes)
        {
            Run(db, Invariant($"INSERT INTO gpkg_geometry_columns VALUES ('{layer.Name}', 'geom', '{GeoBlob.TypeName(layer.Shape)}', {system}, {(layer.HasZ ? 1 : 0)}, 0)"));
        }

        using SqliteCommand row = db.CreateCommand();
        string[] names = [.. layer.Columns.Select((_, i) => Invariant($"$c{i}"))];
        row.CommandText = Invariant($"INSERT INTO \"{layer.Name}\" ({string.Join(", ", [.. shapes ? ["geom"] : Array.Empty<string>(), .. layer.Columns.Select(c => $"\"{c.Name}\"")])}) VALUES ({string.Join(", ", [.. shapes ? ["$geom"] : Array.Empty<string>(), .. names])})");
        if (shapes) row.Parameters.Add("$geom", SqliteType.Blob);
        for (int i = 0; i < names.Length; i++)
            row.Parameters.Add(names[i], layer.Columns[i].IsInteger ? SqliteType.Integer : layer.Columns[i].IsText ? SqliteType.Text : SqliteType.Real);
        foreach (GeoFeature f in layer.Features)
        {
            if (shapes) row.Parameters["$geom"].Value = GeoBlob.Of(f.Points, layer.Shape, layer.HasZ, system);
            for (int i = 0; i < names.Length; i++) row.Parameters[names[i]].Value = Cell(f.Values[i]);
            row.ExecuteNonQuery();
        }
    }

    private static object Cell(object? value) => value switch
    {
        null => DBNull.Value,
        double d when !double.IsFinite(d) => DBNull.Value,
        string s when s.Length == 0 => DBNull.Value,
        _ => value,
    };

    private static (double, double, double, double)? Box(GeoLayer layer)
    {
        Vec3[] all = [.. layer.Features.SelectMany(f => f.Points)];
        return all.Length == 0 ? null : (all.Min(p => p.X), all.Min(p => p.Y), all.Max(p => p.X), all.Max(p => p.Y));
    }

    private static void AddStyles(SqliteConnection db, IReadOnlyList<GeoLayer> layers, string when)
    {
        Run(db, GeoPackageTables.Styles);
        Run(db, Invariant($"INSERT INTO gpkg_contents VALUES ('layer_styles', 'attributes', 'layer_styles', 'Styles of the layers', '{when}', NULL, NULL, NULL, NULL, NULL)"));
        foreach (GeoLayer layer in layers.Where(l => l.Sld.Length > 0))
        {
            using SqliteCommand add = db.CreateCommand();
            add.CommandText = "INSERT INTO layer_styles (f_table_catalog, f_table_schema, f_table_name, f_geometry_column, styleName, styleQML, styleSLD, useAsDefault, description, owner, ui, update_time) VALUES ('', '', $t, 'geom', $t, NULL, $sld, 1, $meaning, '', NULL, $when)";
            add.Parameters.AddWithValue("$t", layer.Name);
            add.Parameters.AddWithValue("$sld", layer.Sld);
            add.Parameters.AddWithValue("$meaning", layer.Meaning);
            add.Parameters.AddWithValue("$when", when);
            add.ExecuteNonQuery();
        }
    }

    private static void Run(SqliteConnection db, string sql)
    {
        using SqliteCommand command = db.CreateCommand();
        command.CommandText = sql;
        command.ExecuteNonQuery();
    }
}
