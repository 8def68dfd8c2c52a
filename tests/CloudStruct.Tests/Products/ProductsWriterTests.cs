using System.Text.Json;
using CloudStruct.Products;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Stages;

namespace CloudStruct.Tests.Products;

public class ProductsWriterTests
{
    [Fact]
    public void All_products_are_written_and_listed()
    {
        using var scratch = new Scratch();
        IReadOnlyList<string> files = Write(scratch.Folder, Samples.Dike(), SampleDrawings.All());
        string[] found = [.. Directory.GetFiles(scratch.Folder, "*", SearchOption.AllDirectories).Select(f => Path.GetRelativePath(scratch.Folder, f).Replace('\\', '/'))];
        Assert.Equal(found.Order(StringComparer.Ordinal), files.Order(StringComparer.Ordinal));
        Assert.Equal(
            ["clouds/classified.las", "map/structures.gpkg", "model/faces.glb", "plots/net-contacts.pdf", "plots/net-contacts.png", "plots/net-contacts.svg", "plots/net-host.pdf", "plots/net-host.png",
             "plots/net-host.svg", "plots/view-colour-plan.png", "plots/width-dike-1.pdf", "plots/width-dike-1.png", "plots/width-dike-1.svg", "report.html",
             "tables/checkpoints.csv", "tables/classes.csv", "tables/common_means.csv", "tables/contacts.csv", "tables/dikes.csv", "tables/faces.csv", "tables/sets.csv",
             "tables/tables-metadata.json", "tables/width.csv", "tables/width_trends.csv"],
            files.Order(StringComparer.Ordinal));
    }

    [Fact]
    public void The_same_findings_give_the_same_bytes_on_any_number_of_threads()
    {
        using var one = new Scratch();
        using var two = new Scratch();
        IReadOnlyList<string> files = Write(one.Folder, Samples.Dike(), SampleDrawings.All(), 1);
        Assert.Equal(files, Write(two.Folder, Samples.Dike(), SampleDrawings.All(), 4));
        Assert.All(files, f => Assert.Equal(File.ReadAllBytes(one[f]), File.ReadAllBytes(two[f])));
    }

    [Fact]
    public void A_survey_with_nothing_in_it_still_gives_headers_and_a_report()
    {
        using var scratch = new Scratch();
        IReadOnlyList<string> files = Write(scratch.Folder, Samples.Nothing(), new DrawingsRecord());
        Assert.Contains("report.html", files);
        foreach (string table in new[] { "faces", "contacts", "width", "width_trends", "dikes", "sets", "common_means", "classes" })
            Assert.Single(File.ReadAllLines(scratch[$"tables/{table}.csv"]));
        Assert.False(File.Exists(scratch["tables/checkpoints.csv"]));
    }

    [Theory]
    [InlineData("none", "")]
    [InlineData("thinned", "classified.las")]
    [InlineData("las", "classified.las")]
    [InlineData("laz", "classified.laz")]
    public void The_cloud_is_written_as_the_recipe_says(string clouds, string written)
    {
        using var scratch = new Scratch();
        new ProductsWriter().Write(scratch.Folder, Samples.Dike(), new(), SamplePieces.AboutTheDike(), Samples.Facts(), new() { Clouds = clouds }, StageContext.Plain());
        string[] found = Directory.Exists(scratch["clouds"]) ? [.. Directory.GetFiles(scratch["clouds"]).Select(f => Path.GetFileName(f))] : [];
        Assert.Equal(written.Length > 0 ? [written] : [], found);
    }

    [Fact]
    public void Settings_that_cannot_be_used_are_named() =>
        Assert.Equal("products.clouds", Assert.Single(new ProductSettings { Clouds = "ply" }.Check()).Key);

    [Fact]
    public void Metadata_describe_every_table_by_W3C_CSV_on_the_Web()
    {
        // Metadata Vocabulary for Tabular Data, W3C Recommendation 17 December 2015: "@context", "tables" with "url" and
        // "tableSchema"; a column's "titles" must equal the header of the file.
        using var scratch = new Scratch();
        Write(scratch.Folder, Samples.Dike(), new DrawingsRecord());
        using JsonDocument json = JsonDocument.Parse(File.ReadAllBytes(scratch["tables/tables-metadata.json"]));
        Assert.Equal("http://www.w3.org/ns/csvw", json.RootElement.GetProperty("@context")[0].GetString());
        JsonElement[] tables = [.. json.RootElement.GetProperty("tables").EnumerateArray()];
        Assert.Equal(9, tables.Length);
        foreach (JsonElement table in tables)
        {
            string header = File.ReadLines(scratch["tables/" + table.GetProperty("url").GetString()]).First();
            Assert.Equal(header, string.Join(",", table.GetProperty("tableSchema").GetProperty("columns").EnumerateArray().Select(c => c.GetProperty("titles").GetString())));
            Assert.Equal("CC-BY-4.0", table.GetProperty("dc:license").GetString());
            JsonElement notes = table.GetProperty("notes")[0];
            Assert.Equal("1f2e3d4c5b6a", notes.GetProperty("run_id").GetString());
            Assert.Contains("UTM zone 33N", notes.GetProperty("crs").GetString(), StringComparison.Ordinal);
            Assert.Contains("true north", notes.GetProperty("north").GetString(), StringComparison.Ordinal);
            Assert.Contains("metres", notes.GetProperty("frame").GetString(), StringComparison.Ordinal);
        }
    }

    [Fact]
    public void Rasters_layers_and_the_map_are_written_where_there_is_a_surface()
    {
        using var scratch = new Scratch();
        Findings f = DrawnSamples.Findings();
        IReadOnlyList<string> files = new ProductsWriter().Write(
            scratch.Folder, f, DrawnSamples.Drawn(f), SamplePieces.AboutTheDike(), Samples.Facts(), new() { Clouds = "none", Geojson = true }, StageContext.Plain(threads: 3));
        foreach (string name in new[] { "map/ortho.tif", "map/surface.tif", "map/structures.gpkg", "map/faces.geojson", "map/outline.geojson", "model/faces.glb", "plots/map-structures.svg" })
            Assert.Contains(name, files);

        using var again = new Scratch();
        new ProductsWriter().Write(again.Folder, f, DrawnSamples.Drawn(f), SamplePieces.AboutTheDike(), Samples.Facts(), new() { Clouds = "none", Geojson = true }, StageContext.Plain());
        Assert.All(files, name => Assert.Equal(File.ReadAllBytes(scratch[name]), File.ReadAllBytes(again[name])));
    }

    private static IReadOnlyList<string> Write(string folder, Findings findings, DrawingsRecord drawings, int threads = 2) =>
        new ProductsWriter().Write(folder, findings, drawings, SamplePieces.AboutTheDike(), Samples.Facts(), new(), StageContext.Plain(threads: threads));
}
