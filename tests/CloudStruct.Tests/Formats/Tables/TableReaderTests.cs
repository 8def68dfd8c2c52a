using System.Text;
using CloudStruct.Formats.Tables;
using CloudStruct.Records.Complaints;

namespace CloudStruct.Tests.Formats.Tables;

public class TableReaderTests
{
    [Theory]
    [InlineData("id,x_m,y_m\np1,1.5,-2e3\n")]
    [InlineData("id;x_m;y_m\r\np1;1.5;-2e3\r\n")]
    [InlineData("id;x_m;y_m\np1;1,5;-2000\n")]
    [InlineData("ID\tX_M\tY_M\np1\t1.5\t-2000")]
    [InlineData("\n\nid, x_m , y_m\n\"p1\", 1.50 ,-2000,,\n\n")]
    [InlineData("id,x_m,y_m\np1,\"1,5\",-2000\n")]
    public void Separators_and_decimal_marks_are_told_from_the_file(string text)
    {
        Table t = TableReader.Parse(text, "t.csv");
        Assert.Equal(1, t.Count);
        Assert.Equal("p1", t.Text(0, "id"));
        Assert.Equal(1.5, t.Number(0, "x_m"));
        Assert.Equal(-2000, t.Number(0, "y_m"));
        Assert.Null(t.NumberOrNull(0, "z_m"));
    }

    [Theory]
    [InlineData("a;b\n12,345;1\n", "thousands")]                    // twelve or twelve thousand
    [InlineData("a;b\n1,5;2.5\n", "mixed")]
    [InlineData("a;b\n1.234,5;1,5\n", "number was expected")]
    [InlineData("a,b;c\n1,2;3\n", "more than one kind of separator")]
    [InlineData("a,b\n1\n", "another number of cells")]
    [InlineData("a,a\n1,2\n", "stands twice")]
    [InlineData("a,b\nx\"y,2\n", "quote")]
    [InlineData("a,b\n\"open,2\n", "quote")]
    [InlineData("", "empty")]
    [InlineData("a,b\nabc,2\n", "number was expected")]
    [InlineData("a,b\nNaN,2\n", "number was expected")]
    [InlineData("a,b\n,2\n", "missing")]
    public void What_cannot_be_read_without_guessing_is_refused(string text, string word)
    {
        var e = Assert.Throws<InputException>(() =>
        {
            Table t = TableReader.Parse(text, "t.csv");
            for (int i = 0; i < t.Count; i++) t.Number(i, "a");
        });
        Assert.Contains(word, e.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void One_certain_cell_settles_the_decimal_comma()
    {
        Table t = TableReader.Parse("a;b\n12,345;612345,678\n", "t.csv");
        Assert.Equal(12.345, t.Number(0, "a"));
    }

    [Fact]
    public void Messages_name_line_and_column()
    {
        Table t = TableReader.Parse("a,b\n1,2\n\n\"x\ny\",3\n", "t.csv");
        var e = Assert.Throws<InputException>(() => t.Number(1, "a"));
        Assert.StartsWith("t.csv, line 4, column a", e.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Utf8_and_utf16_are_read_with_and_without_marks()
    {
        const string text = "name,x\nBjørn,1\n";
        Encoding[] encodings = [new UTF8Encoding(false), new UTF8Encoding(true), new UnicodeEncoding(false, true), new UnicodeEncoding(true, true),
            new UnicodeEncoding(false, false), new UnicodeEncoding(true, false)];
        foreach (Encoding encoding in encodings)
        {
            Table t = Read([.. encoding.GetPreamble(), .. encoding.GetBytes(text)]);
            Assert.Equal("Bjørn", t.Text(0, "name"));
            Assert.Equal(1, t.Number(0, "x"));
        }
    }

    [Fact]
    public void Other_code_pages_and_binary_files_are_refused()
    {
        Assert.Contains("UTF-8", Assert.Throws<InputException>(() => Read(Encoding.Latin1.GetBytes("name\nBjørn\n"))).Message, StringComparison.Ordinal);
        Assert.Throws<InputException>(() => Read([1, 2, 0, 4, 0, 0, 7]));
        Assert.Throws<InputException>(() => Read([0xFF, 0xFE, 65]));
    }

    private static Table Read(byte[] bytes)
    {
        string path = Path.Combine(Path.GetTempPath(), Path.GetRandomFileName());
        File.WriteAllBytes(path, bytes);
        try
        {
            return TableReader.Read(path);
        }
        finally
        {
            File.Delete(path);
        }
    }
}
