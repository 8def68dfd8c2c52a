using CloudStruct.Formats;
using CloudStruct.Formats.Las;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Sets;
using Microsoft.Data.Sqlite;
using NetTopologySuite.Geometries;
using NetTopologySuite.IO;

namespace CloudStruct.Tests.Formats;

public sealed class EvidenceFilesTests : IDisposable
{
    private readonly string folder = Directory.CreateTempSubdirectory("evidence").FullName;

    public void Dispose() => Directory.Delete(folder, true);

    [Fact]
    public void Csv_labels_hold_place_class_and_use()
    {
        HandLabels labels = EvidenceFiles.ReadLabels(Text("l.csv", "x_m;y_m;z_m;class;use\n600000,25;10,5;1,5;dike;check\n1,0;2,0;3,0;Host;\n0,5;0;0;;ignore\n"));
        Assert.Equal(new LabelPoint(new(600000.25, 10.5, 1.5), RockClass.Dike, LabelUse.Check), labels.Points[0]);
        Assert.Equal(new LabelPoint(new(1, 2, 3), RockClass.Host, LabelUse.Train), labels.Points[1]);
        Assert.Equal(LabelUse.Ignore, labels.Points[2].Use);
    }

    [Theory]
    [InlineData("x_m,y_m,z_m,class\n1,2,3,basalt\n", "class")]
    [InlineData("x_m,y_m,z_m,class,use\n1,2,3,dike,test\n", "use")]
    [InlineData("x_m,y_m,class\n1,2,dike\n", "z_m")]
    public void Wrong_words_and_missing_columns_are_named(string text, string word) =>
        Assert.Contains(word, Assert.Throws<InputException>(() => EvidenceFiles.ReadLabels(Text("l.csv", text))).Message, StringComparison.Ordinal);

    [Fact]
    public void GeoJson_labels_hold_rings_heights_and_words()
    {
        HandLabels labels = EvidenceFiles.ReadLabels(Text("l.geojson", """
            {"type":"FeatureCollection","name":"x","features":[
             {"type":"Feature","properties":{"class":"dike","use":"train","z_min_m":100,"z_max_m":"120.5"},"geometry":{"type":"Polygon",
              "coordinates":[[[600000,10],[600010,10],[600010,20],[600000,20],[600000,10]],[[600002,12],[600004,12],[600004,14],[600002,12]]]}},
             {"type":"Feature","properties":{"class":"host","use":"check"},"geometry":{"type":"MultiPolygon",
              "coordinates":[[[[0,0],[1,0],[1,1],[0,0]]],[[[5,5],[6,5],[6,6],[5,5]]]]}}]}
            """));
        Assert.Equal(3, labels.Polygons.Length);
        LabelPolygon p = labels.Polygons[0];
        Assert.Equal((RockClass.Dike, LabelUse.Train, 100.0, 120.5), (p.Class, p.Use, p.ZMinM, p.ZMaxM));
        Assert.Equal([5, 4], p.Rings.Select(r => r.Length));
        Assert.Equal(p.Rings[0][0], p.Rings[0][^1]);
        Assert.Equal(double.NegativeInfinity, labels.Polygons[1].ZMinM);
    }

    [Theory]
    [InlineData("not json")]
    [InlineData("{}")]
    [InlineData("[]")]
    [InlineData("{\"type\":\"FeatureCollection\",\"features\":[{\"type\":\"Feature\",\"properties\":{\"class\":\"dike\"},\"geometry\":{\"type\":\"Polygon\",\"coordinates\":[[[0,0],[1,0]]]}}]}")]
    [InlineData("{\"type\":\"FeatureCollection\",\"features\":[{\"type\":\"Feature\",\"properties\":{\"class\":\"dike\"},\"geometry\":null}]}")]
    [InlineData("{\"type\":\"FeatureCollection\",\"features\":[{\"type\":\"Feature\",\"properties\":{\"class\":\"rock\"},\"geometry\":{\"type\":\"Polygon\",\"coordinates\":[[[0,0],[1,0],[1,1],[0,0]]]}}]}")]
    [InlineData("{\"type\":\"FeatureCollection\",\"features\":[{\"type\":\"Feature\",\"properties\":{\"class\":\"dike\"},\"geometry\":{\"type\":\"Polygon\",\"coordinates\":[[[\"a\",0],[1,0],[1,1],[0,0]]]}}]}")]
    [InlineData("{\"type\":\"FeatureCollection\",\"features\":7}")]
    public void Bad_GeoJson_is_refused(string text) =>
        Assert.Throws<InputException>(() => EvidenceFiles.ReadLabels(Text("l.geojson", text)));

    [Fact]
    public void GeoJson_that_is_not_utf8_is_refused()
    {
        string path = Path.Combine(folder, "l.geojson");
        File.WriteAllBytes(path, System.Text.Encoding.Latin1.GetBytes("{\"type\":\"FeatureCollection\",\"features\":[{\"type\":\"Feature\",\"properties\":{\"class\":\"d\u00edke\"},\"geometry\":null}]}"));
        Assert.Throws<InputException>(() => EvidenceFiles.ReadLabels(path));
    }

    [Fact]
    public void GeoPackage_labels_are_read_from_every_label_layer()
    {
        string path = Path.Combine(folder, "l.gpkg");
        using (var db = new SqliteConnection($"Data Source={path};Pooling=False"))
        {
            db.Open();
            // The tables that the standard asks of features, as far as a reader needs them (OGC GeoPackage 1.3, clause 2.1).
            Run(db, "CREATE TABLE gpkg_geometry_columns (table_name TEXT, column_name TEXT, geometry_type_name TEXT, srs_id INTEGER, z TINYINT, m TINYINT)");
            Run(db, "INSERT INTO gpkg_geometry_columns VALUES ('my \"labels\"','geom','POLYGON',32632,0,0),('other','geom','POINT',32632,0,0)");
            Run(db, "CREATE TABLE \"my \"\"labels\"\"\" (fid INTEGER PRIMARY KEY, geom BLOB, class TEXT, use TEXT, z_min_m REAL)");
            Run(db, "CREATE TABLE other (fid INTEGER PRIMARY KEY, geom BLOB)");
            var polygon = new Polygon(new LinearRing([new(0, 0), new(4, 0), new(4, 3), new(0, 0)])) { SRID = 32632 };
            using SqliteCommand insert = db.CreateCommand();
            insert.CommandText = "INSERT INTO \"my \"\"labels\"\"\" VALUES (1,$g,'inclusion','check',12.5)";
            insert.Parameters.AddWithValue("$g", new GeoPackageGeoWriter().Write(polygon));
            insert.ExecuteNonQuery();
        }
        LabelPolygon p = Assert.Single(EvidenceFiles.ReadLabels(path).Polygons);
        Assert.Equal((RockClass.Inclusion, LabelUse.Check, 12.5), (p.Class, p.Use, p.ZMinM));
        Assert.Equal(new Vec3(4, 3, 0), p.Rings[0][2]);
    }

    [Fact]
    public void A_file_that_is_no_GeoPackage_is_refused()
    {
        Assert.Throws<InputException>(() => EvidenceFiles.ReadLabels(Text("l.gpkg", "hello")));
        Assert.Throws<InputException>(() => EvidenceFiles.ReadLabels(Text("m.gpkg", "SQLite format 3\0 and nothing of the kind")));
    }

    [Fact]
    public void Las_labels_are_the_points_with_our_classes()
    {
        string path = Path.Combine(folder, "l.las");
        using (var writer = new LasWriter(path, new LasLayout { HasColour = false }))
        {
            writer.Write(new LasBatch { Count = 3, X = new double[] { 1, 2, 3 }, Y = new double[3], Z = new double[3], Class = new byte[] { 65, 2, 68 } });
        }
        HandLabels labels = EvidenceFiles.ReadLabels([path, Text("l.csv", "x_m,y_m,z_m,class\n1,2,3,cover\n")]);
        Assert.Equal([RockClass.Dike, RockClass.Loose, RockClass.Cover], labels.Points.Select(p => p.Class));
    }

    [Fact]
    public void Control_points_keep_model_place_sigmas_and_role()
    {
        ControlPoint[] points = EvidenceFiles.ReadControl(Text("c.csv",
            "id,x_m,y_m,z_m,model_x_m,model_y_m,model_z_m,sigma_h_m,sigma_v_m,role\nT1,1,2,3,1.01,2.02,3.03,0.01,0.02,control\nT2,4,5,6,,,,,,check\n"));
        Assert.Equal(new ControlPoint("T1", new(1, 2, 3), new Vec3(1.01, 2.02, 3.03), 0.01, 0.02, false), points[0]);
        Assert.Equal(new ControlPoint("T2", new(4, 5, 6), null, 0, 0, true), points[1]);
    }

    [Theory]
    [InlineData("id,x_m,y_m,z_m\nT1,1,2,3\nT1,4,5,6\n")]
    [InlineData("id,x_m,y_m,z_m,role\nT1,1,2,3,both\n")]
    [InlineData("id,x_m,y_m,z_m,model_x_m\nT1,1,2,3,4\n")]
    [InlineData("id,x_m,y_m,z_m,sigma_h_m\nT1,1,2,3,-1\n")]
    public void Bad_control_points_are_refused(string text) => Assert.Throws<InputException>(() => EvidenceFiles.ReadControl(Text("c.csv", text)));

    [Fact]
    public void A_baseline_is_one_line()
    {
        Assert.Equal([new Vec3(1, 2, 0), new Vec3(3, 4, 5)], EvidenceFiles.ReadBaseline(Text("b.geojson",
            "{\"type\":\"Feature\",\"properties\":null,\"geometry\":{\"type\":\"LineString\",\"coordinates\":[[1,2],[3,4,5]]}}")));
        Assert.Equal(2, EvidenceFiles.ReadBaseline(Text("c.geojson", "{\"type\":\"LineString\",\"coordinates\":[[1,2],[3,4]]}")).Length);
        Assert.Throws<InputException>(() => EvidenceFiles.ReadBaseline(Text("d.geojson", "{\"type\":\"Point\",\"coordinates\":[1,2]}")));
        Assert.Throws<InputException>(() => EvidenceFiles.ReadBaseline(Text("e.geojson", "{\"type\":\"LineString\",\"coordinates\":[[1,2],[1,2]]}")));
    }

    private string Text(string name, string text)
    {
        string path = Path.Combine(folder, name);
        File.WriteAllText(path, text);
        return path;
    }

    private static void Run(SqliteConnection db, string sql)
    {
        using SqliteCommand command = db.CreateCommand();
        command.CommandText = sql;
        command.ExecuteNonQuery();
    }

    [Fact]
    public void Zones_are_named_polygons()
    {
        const string ring = "[[0,0],[4,0],[4,4],[0,0]]";
        Zone[] z = EvidenceFiles.ReadZones(Text("z.geojson",
            "{\"type\":\"FeatureCollection\",\"features\":[{\"type\":\"Feature\",\"properties\":{\"name\":\"cliff\"},\"geometry\":{\"type\":\"Polygon\",\"coordinates\":["
            + ring + "]}},{\"type\":\"Feature\",\"properties\":{},\"geometry\":{\"type\":\"Polygon\",\"coordinates\":[" + ring + "]}}]}"));
        Assert.Equal(["cliff", "z 2"], z.Select(x => x.Name));
        Assert.Equal(4, z[0].Rings[0].Length);
        Assert.Throws<InputException>(() => EvidenceFiles.ReadZones(Text("y.geojson", "{\"type\":\"Point\",\"coordinates\":[1,2]}")));
    }
}
