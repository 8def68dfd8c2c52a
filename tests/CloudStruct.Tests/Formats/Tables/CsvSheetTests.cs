using System.Text;
using System.Text.Json;
using CloudStruct.Formats.Tables;

namespace CloudStruct.Tests.Formats.Tables;

public class CsvSheetTests
{
    private enum Status { AHidden, Measured }

    // RFC 4180 sections 2.1 to 2.7: CR LF, header, quotes round comma, quote and line break, inner quotes doubled.
    [Fact]
    public void Text_follows_rfc_4180()
    {
        var sheet = new CsvSheet("t.csv", "T", new CsvColumn("a", CsvKind.Text), new CsvColumn("b", CsvKind.Metres));
        sheet.Add("plain", 1.23456);
        sheet.Add("with \"quotes\", comma\r\nand break", null);
        Assert.Equal("a,b\r\nplain,1.235\r\n\"with \"\"quotes\"\", comma\r\nand break\",\r\n", sheet.ToString());
    }

    // DESIGN: angles 2 decimals, metres 3, areas and others 4 significant digits; empty for what is not determined.
    [Theory]
    [InlineData(CsvKind.AngleDeg, 12.345678, "12.35")]
    [InlineData(CsvKind.AngleDeg, -0.001, "0.00")]
    [InlineData(CsvKind.AzimuthDeg, 359.999, "0.00")]
    [InlineData(CsvKind.AzimuthDeg, -90.0, "270.00")]
    [InlineData(CsvKind.AxisDeg, 190.5, "10.50")]
    [InlineData(CsvKind.AxisDeg, 179.996, "0.00")]
    [InlineData(CsvKind.Metres, 6600001.23456, "6600001.235")]
    [InlineData(CsvKind.Metres, -0.0004, "0.000")]
    [InlineData(CsvKind.Number, 123456.7, "123500")]
    [InlineData(CsvKind.Number, 9.9996, "10.00")]
    [InlineData(CsvKind.Number, 0.012345, "0.01235")]
    [InlineData(CsvKind.Number, 1.5, "1.500")]
    [InlineData(CsvKind.Number, -0.00123449, "-0.001234")]
    [InlineData(CsvKind.Number, 1.23456e-7, "1.235E-7")]
    [InlineData(CsvKind.Number, 0.0, "0")]
    [InlineData(CsvKind.Number, double.NaN, "")]
    [InlineData(CsvKind.Metres, double.PositiveInfinity, "")]
    [InlineData(CsvKind.Integer, 12.0, "12")]
    [InlineData(CsvKind.Exact, 0.1, "0.1")]
    public void Digits_follow_the_kind(CsvKind kind, double value, string text) => Assert.Equal(text, CellText.Of(kind, value));

    [Fact]
    public void Words_and_truth_values_are_plain()
    {
        Assert.Equal("a_hidden", CellText.Of(CsvKind.Text, Status.AHidden));
        Assert.Equal("yes", CellText.Of(CsvKind.YesNo, true));
        Assert.Equal("", CellText.Of(CsvKind.YesNo, null));
        Assert.Equal("3", CellText.Of(CsvKind.Integer, 3));
        Assert.Throws<ArgumentException>(() => CellText.Of(CsvKind.YesNo, 1));
    }

    [Fact]
    public void A_row_of_the_wrong_length_is_our_fault() =>
        Assert.Throws<ArgumentException>(() => new CsvSheet("t.csv", "T", new CsvColumn("a", CsvKind.Text)).Add("x", "y"));

    // W3C Metadata Vocabulary for Tabular Data (2015): @context, tables, url, tableSchema, columns with name and datatype.
    [Fact]
    public void Metadata_names_every_table_column_and_unit()
    {
        var sheet = new CsvSheet("faces.csv", "Faces", new CsvColumn("face_id", CsvKind.Integer, "", "Number of the face"),
            new CsvColumn("dip_deg", CsvKind.AngleDeg, "degree"), new CsvColumn("in_place", CsvKind.YesNo));
        using var stream = new MemoryStream();
        CsvMetadata.Write(stream, [sheet], new TableFacts { RunId = "r1", North = "true", Licence = "CC-BY-4.0" });
        JsonElement root = JsonDocument.Parse(Encoding.UTF8.GetString(stream.ToArray())).RootElement;
        Assert.Equal("http://www.w3.org/ns/csvw", root.GetProperty("@context")[0].GetString());
        JsonElement table = root.GetProperty("tables")[0];
        Assert.Equal("faces.csv", table.GetProperty("url").GetString());
        Assert.Equal("true", table.GetProperty("notes")[0].GetProperty("north").GetString());
        JsonElement columns = table.GetProperty("tableSchema").GetProperty("columns");
        Assert.Equal(3, columns.GetArrayLength());
        Assert.Equal("double", columns[1].GetProperty("datatype").GetString());
        Assert.Equal("degree", columns[1].GetProperty("schema:unitText").GetString());
        Assert.Equal("integer", columns[0].GetProperty("datatype").GetString());
    }
}
