using System.Text;
using CloudStruct.Formats;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Points;

namespace CloudStruct.Tests.Formats.Text;

public class TextCloudTests
{
    [Theory]
    [InlineData("1.5 2.5 3.5\n4 5 6\n")]
    [InlineData("1.5\t2.5\t3.5\r\n4\t5\t6")]
    [InlineData("1.5,2.5,3.5\n4,5,6\n")]
    [InlineData("1.5, 2.5, 3.5\n4, 5, 6\n")]
    [InlineData("1.5;2.5;3.5\n4;5;6\n")]
    [InlineData("1,5;2,5;3,5\n4;5;6\n")]
    [InlineData("1,5 2,5 3,5\n4,0 5,0 6,0\n")]
    [InlineData("# made by hand\n\n  1.5   2.5 3.5 \n// more\n4 5 6\n")]
    [InlineData("2\n1.5 2.5 3.5\n4 5 6\n")]
    [InlineData("x y z\n1.5 2.5 3.5\n4 5 6\n")]
    [InlineData("z,x,y\n3.5,1.5,2.5\n6,4,5\n")]
    [InlineData("\uFEFFEasting;Northing;Height\n1,5;2,5;3,5\n4;5;6\n")]
    public void Separators_names_and_decimal_marks_are_told_from_the_first_lines(string text)
    {
        CloudPoints p = Points(text, out CloudHeader header);
        Assert.Equal([1.5, 4], p.X);
        Assert.Equal([2.5, 5], p.Y);
        Assert.Equal([3.5, 6], p.Z);
        Assert.Equal(2, header.Points);
        Assert.False(header.HasColour);
    }

    [Theory]
    [InlineData("1 2 3 10 20 30\n4 5 6 255 0 7\n", 10, 20, 30)]
    [InlineData("1 2 3 1000 2000 65280\n", 1000, 2000, 65280)]
    [InlineData("1 2 3 0.5 0 1\n", 32768, 0, 65535)]
    [InlineData("1 2 3 -812.5 10 20 30\n", 10, 20, 30)]
    [InlineData("1 2 3 10 20 30 0.123\n", 10, 20, 30)]
    [InlineData("intensity x y z b g r class\n9 1 2 3 30 20 10 5\n", 10, 20, 30)]
    public void Colour_is_found(string text, int r, int g, int b)
    {
        CloudPoints p = Points(text, out CloudHeader header);
        Assert.True(header.HasColour);
        Assert.Equal((1.0, 2.0, 3.0), (p.X[0], p.Y[0], p.Z[0]));
        Assert.Equal((r, g, b), (p.Red[0], p.Green[0], p.Blue[0]));
    }

    [Theory]
    [InlineData("1 2\n3 4\n", "cannot be told")]
    [InlineData("1 2 3 10 20 30 40\n", "cannot be told")]
    [InlineData("1 2 3 4 5 6 7 8\n", "cannot be told")]
    [InlineData("1 2 3\n4 5\n", "line 2")]
    [InlineData("hello\nworld\n", "not points")]
    [InlineData("# nothing\n", "holds no points")]
    [InlineData("a b c\n1 2 3\n", "which columns are x, y and z")]
    public void What_would_need_a_guess_is_refused(string text, string says) =>
        Assert.Contains(says, Assert.Throws<InputException>(() => Points(text, out _)).Message, StringComparison.Ordinal);

    [Fact]
    public void A_bad_line_far_down_is_named()
    {
        var text = new StringBuilder();
        for (int i = 0; i < 20_000; i++) text.Append(i == 15_000 ? "1 two 3\n" : "600000.125 6600000.375 12.5\n");
        InputException e = Assert.Throws<InputException>(() => Points(text.ToString(), out _));
        Assert.Contains("line 15001", e.Message, StringComparison.Ordinal);
        Assert.Contains("1 two 3", e.Message, StringComparison.Ordinal);
    }

    // Lines fall across the reader's buffer at every place.
    [Fact]
    public void Many_points_come_in_order_and_whole()
    {
        var text = new StringBuilder();
        for (int i = 0; i < 150_000; i++) text.Append(System.Globalization.CultureInfo.InvariantCulture, $"{i} {i * 2} {i % 7}\n");
        CloudPoints p = Points(text.ToString(), out CloudHeader header);
        Assert.Equal(150_000, header.Points);
        Assert.Equal(150_000, p.Count);
        for (int i = 0; i < p.Count; i += 997) Assert.Equal((i, i * 2, i % 7), ((int)p.X[i], (int)p.Y[i], (int)p.Z[i]));
    }

    private static CloudPoints Points(string text, out CloudHeader header)
    {
        using var file = new CloudFile("a.xyz", Encoding.UTF8.GetBytes(text));
        header = CloudFiles.Inspect(file.Path);
        return CloudFile.Points(file.Path);
    }
}
