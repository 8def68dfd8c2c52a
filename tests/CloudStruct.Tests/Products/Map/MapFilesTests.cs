using System.Buffers.Binary;
using System.Globalization;
using System.Text.Json;
using System.Xml.Linq;
using CloudStruct.Products;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Stages;
using CloudStruct.Tests.Kit;
using Microsoft.Data.Sqlite;

namespace CloudStruct.Tests.Products.Map;

/// <summary>map/: our own reading of the files, and that of GDAL (Debian package gdal-bin) where it is installed.</summary>
public class MapFilesTests
{
    private const double TurnDeg = 0.42;

    [Fact]
    public void A_GeoPackage_names_itself_and_its_version()
    {
        // SQLite file format: user version at byte 60, application id at 68. OGC 12-128r17: "GPKG", 10300 for version 1.3.0.
        using Scratch scratch = Written();
        byte[] bytes = File.ReadAllBytes(scratch["map/structures.gpkg"]);
        Assert.Equal(10300u, BinaryPrimitives.ReadUInt32BigEndian(bytes.AsSpan(60)));
        Assert.Equal(1196444487u, BinaryPrimitives.ReadUInt32BigEndian(bytes.AsSpan(68)));
        Assert.Equal("ok", Ask(scratch, "PRAGMA integrity_check").Single()[0]);
        Assert.Empty(Ask(scratch, "PRAGMA foreign_key_check"));
        Assert.Equal("2025-06-14T00:00:00.000Z", Assert.Single(Ask(scratch, "SELECT DISTINCT last_change FROM gpkg_contents"))[0]);
    }

    [Fact]
    public void Symbols_turn_by_the_strike_about_grid_north()
    {
        // True azimuth = grid azimuth + convergence (DESIGN section 3): the table's strike less 0.42 deg.
        using Scratch scratch = Written();
        object[][] rows = Ask(scratch, "SELECT strike_deg, rotation_grid_deg, dip_deg, symbol FROM faces");
        Assert.Equal(5, rows.Length);
        Assert.All(rows, r => Assert.Equal(0, Math.Sin(((double)r[0] - (double)r[1] - TurnDeg) * Math.PI / 360), 1e-9));
        Assert.Contains(rows, r => (string)r[3] == "inclined");
        XDocument style = XDocument.Parse((string)Ask(scratch, "SELECT styleSLD FROM layer_styles WHERE f_table_name = 'faces' AND useAsDefault = 1").Single()[0]);
        Assert.All(style.Descendants().Where(e => e.Name.LocalName == "Rotation"), e => Assert.Equal("rotation_grid_deg", e.Value));
        Assert.Equal(3, style.Descendants().Count(e => e.Name.LocalName == "Rotation"));
    }

    [Fact]
    public void Numbers_keep_all_their_digits()
    {
        using Scratch scratch = Written();
        Assert.Contains(Ask(scratch, "SELECT strike_deg FROM faces"), r => (double)r[0] == 359.998);
    }

    [ToolFact("ogrinfo")]
    public void Ogrinfo_reads_every_layer_without_a_word_of_warning()
    {
        using Scratch scratch = Written();
        (int exit, string said, string error) = Tool.Run(scratch.Folder, "ogrinfo", "-ro", "-al", "map/structures.gpkg");
        Assert.Equal(0, exit);
        Assert.Equal("", error);
        Assert.DoesNotContain("Warning", said, StringComparison.OrdinalIgnoreCase);
        foreach (string layer in new[] { "faces", "contacts", "stations", "sets", "outline" }) Assert.Contains("Layer name: " + layer, said, StringComparison.Ordinal);
        Assert.Contains("ID[\"EPSG\",32633]", said, StringComparison.Ordinal);
        Assert.Contains("POINT Z (512300", said, StringComparison.Ordinal);
        Assert.Contains("POLYGON ((512", said, StringComparison.Ordinal);
        (exit, said, error) = Tool.Run(scratch.Folder, "ogrinfo", "-ro", "-al", "map/faces.geojson");
        Assert.Equal((0, ""), (exit, error));
        Assert.Contains("Feature Count: 5", said, StringComparison.Ordinal);
        Assert.Contains("ID[\"EPSG\",32633]", said, StringComparison.Ordinal);
    }

    [ToolFact("ogrinfo")]
    public void Ogrinfo_reads_a_survey_without_a_system()
    {
        Findings f = DrawnSamples.Findings();
        SurveyFrame bare = f.Intake.Frame with { Crs = CrsInfo.None, North = North.Model, ConvergenceDeg = null };
        using Scratch scratch = Written(f with { Intake = f.Intake with { Frame = bare }, Described = f.Described with { Cloud = f.Described.Cloud with { Frame = bare } } });
        (int exit, string said, string error) = Tool.Run(scratch.Folder, "ogrinfo", "-ro", "-so", "map/structures.gpkg", "faces");
        Assert.Equal((0, ""), (exit, error));
        Assert.Contains("Undefined Cartesian", said, StringComparison.OrdinalIgnoreCase);
    }

    [ToolFact("gdalinfo")]
    public void Gdalinfo_reads_place_system_tiles_and_nodata()
    {
        using Scratch scratch = Written();
        foreach ((string file, int bands) in new[] { ("map/ortho.tif", 4), ("map/surface.tif", 1) })
        {
            (int exit, string said, string error) = Tool.Run(scratch.Folder, "gdalinfo", "-json", file);
            Assert.Equal((0, ""), (exit, error));
            JsonElement info = JsonDocument.Parse(said).RootElement;
            Assert.Equal(bands, info.GetProperty("bands").GetArrayLength());
            Assert.Contains("ID[\"EPSG\",32633]", info.GetProperty("coordinateSystem").GetProperty("wkt").GetString(), StringComparison.Ordinal);
            JsonElement band = info.GetProperty("bands")[0];
            Assert.Equal([256, 256], band.GetProperty("block").EnumerateArray().Select(v => v.GetInt32()));
            Assert.Equal("DEFLATE", info.GetProperty("metadata").GetProperty("IMAGE_STRUCTURE").GetProperty("COMPRESSION").GetString());
            if (bands == 1) Assert.Equal(-9999, band.GetProperty("noDataValue").GetDouble());
        }
    }

    [ToolFact("gdallocationinfo")]
    public void Gdal_finds_the_height_and_colour_of_the_rock_at_its_map_coordinates()
    {
        // The sample surface is z = 1200 + 0.1 (x + 7) in local metres; red, green, blue fall off by halves.
        using Scratch scratch = Written();
        (int exit, string said, string _) = Tool.Run(scratch.Folder, "gdallocationinfo", "-valonly", "-geoloc", "map/surface.tif", "512302", "4178901");
        Assert.Equal(0, exit);
        Assert.Equal(1200.9, double.Parse(said, CultureInfo.InvariantCulture), 0.02);
        (exit, said, string _) = Tool.Run(scratch.Folder, "gdallocationinfo", "-valonly", "-geoloc", "map/ortho.tif", "512302", "4178901");
        Assert.Equal(0, exit);
        int[] bands = [.. said.Split('\n', StringSplitOptions.RemoveEmptyEntries).Select(v => int.Parse(v, CultureInfo.InvariantCulture))];
        Assert.InRange(bands[0], 80, 179);
        Assert.Equal((bands[0] / 2, bands[0] / 4, 255), (bands[1], bands[2], bands[3]));
    }

    private static Scratch Written(Findings? findings = null)
    {
        var scratch = new Scratch();
        Findings f = findings ?? DrawnSamples.Findings();
        new ProductsWriter().Write(
            scratch.Folder, f, DrawnSamples.Drawn(f), SamplePieces.AboutTheDike(), Samples.Facts(), new() { Clouds = "none", Geojson = true }, StageContext.Plain());
        return scratch;
    }

    private static object[][] Ask(Scratch scratch, string sql)
    {
        using var db = new SqliteConnection(new SqliteConnectionStringBuilder { DataSource = scratch["map/structures.gpkg"], Mode = SqliteOpenMode.ReadOnly, Pooling = false }.ToString());
        db.Open();
        using SqliteCommand command = db.CreateCommand();
        command.CommandText = sql;
        using SqliteDataReader reader = command.ExecuteReader();
        var rows = new List<object[]>();
        while (reader.Read())
        {
            object[] row = new object[reader.FieldCount];
            reader.GetValues(row);
            rows.Add(row);
        }

        return [.. rows];
    }
}
