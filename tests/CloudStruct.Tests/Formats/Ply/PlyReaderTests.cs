using System.Text;
using CloudStruct.Formats;
using CloudStruct.Formats.Las;
using CloudStruct.Formats.Meshes;
using CloudStruct.Formats.Ply;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Points;

namespace CloudStruct.Tests.Formats.Ply;

public class PlyReaderTests
{
    private static readonly string[] Encodings = ["ascii", "binary_little_endian", "binary_big_endian"];

    // The scalar types and their aliases: testdata/reference/file_facts.csv.
    [Theory]
    [InlineData("char", -100)]
    [InlineData("int8", -100)]
    [InlineData("uchar", 200)]
    [InlineData("uint8", 200)]
    [InlineData("short", -30000)]
    [InlineData("int16", -30000)]
    [InlineData("ushort", 60000)]
    [InlineData("uint16", 60000)]
    [InlineData("int", -2000000000)]
    [InlineData("int32", -2000000000)]
    [InlineData("uint", 4000000000)]
    [InlineData("uint32", 4000000000)]
    [InlineData("float", 0.15625)]
    [InlineData("float32", -12345.5)]
    [InlineData("double", 6600000.123456789)]
    [InlineData("float64", -1.7976931348623157e308)]
    public void Every_type_is_read_in_every_encoding(string type, double value)
    {
        foreach (string encoding in Encodings)
        {
            byte[] file = new PlyText(encoding).Line("comment any").Line("element vertex 2").Line($"property {type} z").Line("property uchar other")
                .Line($"property {type} x").Line($"property {type} y")
                .Record((type, value), ("uchar", 9), (type, 1), (type, 2)).Record((type, 3), ("uchar", 9), (type, value), (type, 4)).Make();
            CloudPoints p = Read(file);
            Assert.Equal([1, value], p.X);
            Assert.Equal([2, 4], p.Y);
            Assert.Equal([value, 3], p.Z);
        }
    }

    [Fact]
    public void Lists_are_skipped_wherever_they_stand()
    {
        foreach (string encoding in Encodings)
        {
            byte[] file = new PlyText(encoding)
                .Line("element before 2").Line("property list uchar float a").Line("property list int uchar b").Line("property short c")
                .Line("element vertex 2").Line("property list uchar double u").Line("property double x").Line("property list uint short v")
                .Line("property double y").Line("property double z").Line("property list uchar uchar w")
                .Line("element after 1").Line("property list uchar int vertex_indices")
                .Record(("uchar", 2), ("float", 1), ("float", 2), ("int", 0), ("short", 7))
                .Record(("uchar", 0), ("int", 3), ("uchar", 1), ("uchar", 2), ("uchar", 3), ("short", 8))
                .Record(("uchar", 1), ("double", 99), ("double", 10), ("uint", 2), ("short", 5), ("short", 6), ("double", 20), ("double", 30), ("uchar", 0))
                .Record(("uchar", 0), ("double", 11), ("uint", 0), ("double", 21), ("double", 31), ("uchar", 3), ("uchar", 1), ("uchar", 1), ("uchar", 1))
                .Record(("uchar", 3), ("int", 0), ("int", 1), ("int", 0)).Make();
            CloudPoints p = Read(file);
            Assert.Equal([10, 11], p.X);
            Assert.Equal([20, 21], p.Y);
            Assert.Equal([30, 31], p.Z);
        }
    }

    [Theory]
    [InlineData("\n")]
    [InlineData("\r\n")]
    [InlineData("\r")]
    public void Header_lines_end_in_any_way_and_data_may_start_with_a_line_feed(string newline)
    {
        // 10 as the first data byte looks like the second half of a CR LF.
        foreach (string encoding in Encodings)
        {
            byte[] file = new PlyText(encoding, newline).Line("element vertex 2").Line("property uchar x").Line("property uchar y").Line("property uchar z")
                .Record(("uchar", 10), ("uchar", 13), ("uchar", 1)).Record(("uchar", 4), ("uchar", 5), ("uchar", 6)).Make();
            CloudPoints p = Read(file);
            Assert.Equal([10, 4], p.X);
            Assert.Equal([13, 5], p.Y);
            Assert.Equal([1, 6], p.Z);
        }
    }

    [Theory]
    [InlineData("uchar", 255, 255)]
    [InlineData("ushort", 65280, 65280)]
    [InlineData("int", 70000, 65535)]
    [InlineData("int", -3, 0)]
    [InlineData("char", -1, 255)]
    [InlineData("float", 0.5, 32768)]
    [InlineData("double", 1, 65535)]
    [InlineData("float", 200, 200)]
    public void Colour_comes_in_many_types(string type, double value, int expected)
    {
        foreach (string encoding in Encodings)
        {
            byte[] file = new PlyText(encoding).Line("element vertex 1").Line("property float x").Line("property float y").Line("property float z")
                .Line($"property {type} red").Line($"property {type} GREEN").Line($"property {type} blue")
                .Record(("float", 1), ("float", 2), ("float", 3), (type, value), (type, value), (type, 0)).Make();
            CloudPoints p = Read(file);
            Assert.Equal((expected, expected, 0), (p.Red[0], p.Green[0], p.Blue[0]));
        }
    }

    [Fact]
    public void The_same_points_as_las_and_as_three_kinds_of_ply_are_the_same()
    {
        const int n = 70_000;   // more than one block
        var rng = new Random(11);
        double[] x = new double[n], y = new double[n], z = new double[n];
        ushort[] red = new ushort[n], green = new ushort[n], blue = new ushort[n];
        byte[] classes = new byte[n];
        for (int i = 0; i < n; i++)
        {
            x[i] = 600000 + (rng.Next(100_000) / 1000.0);
            y[i] = 6600000 + (rng.Next(100_000) / 1000.0);
            z[i] = rng.Next(30_000) / 1000.0;
            (red[i], green[i], blue[i]) = ((ushort)rng.Next(65536), (ushort)rng.Next(65536), (ushort)rng.Next(65536));
            classes[i] = (byte)rng.Next(256);
        }
        using var stream = new MemoryStream();
        using (var writer = new LasWriter(stream, new LasLayout().Around(new(600000, 6600000, 0), new(600100, 6600100, 30))))
        {
            for (int from = 0; from < n; from += 30_000)
            {
                int k = Math.Min(30_000, n - from);
                writer.Write(new LasBatch
                {
                    Count = k, X = x.AsMemory(from, k), Y = y.AsMemory(from, k), Z = z.AsMemory(from, k), Red = red.AsMemory(from, k),
                    Green = green.AsMemory(from, k), Blue = blue.AsMemory(from, k), Class = classes.AsMemory(from, k),
                });
            }
        }
        using var las = new CloudFile("a.las", stream.ToArray());
        CloudPoints p = las.Points();
        double worst = 0;
        for (int i = 0; i < n; i++) worst = Math.Max(worst, Math.Max(Math.Abs(x[i] - p.X[i]), Math.Max(Math.Abs(y[i] - p.Y[i]), Math.Abs(z[i] - p.Z[i]))));
        Assert.InRange(worst, 0, 2e-9);   // the millimetres are exact; doubles near 6.6 million step by 1e-9
        Assert.Equal(red, p.Red);
        Assert.Equal(blue, p.Blue);
        Assert.Equal(classes, p.Class);
        CloudHeader header = CloudFiles.Inspect(las.Path);
        Assert.Equal((p.X.Min(), p.Y.Min(), p.Z.Min()), (header.Min!.Value.X, header.Min.Value.Y, header.Min.Value.Z));
        Assert.Equal((p.X.Max(), p.Y.Max(), p.Z.Max()), (header.Max!.Value.X, header.Max.Value.Y, header.Max.Value.Z));
        foreach (string encoding in Encodings)
        {
            PlyText ply = new PlyText(encoding).Line($"element vertex {n}").Line("property double x").Line("property double y").Line("property double z")
                .Line("property ushort red").Line("property ushort green").Line("property ushort blue").Line("property uchar class");
            for (int i = 0; i < n; i++)
                ply.Record(("double", x[i]), ("double", y[i]), ("double", z[i]), ("ushort", red[i]), ("ushort", green[i]), ("ushort", blue[i]), ("uchar", classes[i]));
            CloudPoints q = Read(ply.Make());
            Assert.Equal(x, q.X);
            Assert.Equal(y, q.Y);
            Assert.Equal(z, q.Z);
            Assert.Equal(red, q.Red);
            Assert.Equal(green, q.Green);
            Assert.Equal(classes, q.Class);
        }
    }

    // float32 keeps 0.0625 m at 600000 (checks.md X12, numpy spacing).
    [Fact]
    public void Floats_far_from_the_origin_are_flagged_unless_the_text_says_more()
    {
        byte[] Vertex(string encoding, string type, double x) => new PlyText(encoding).Line("element vertex 1").Line($"property {type} x")
            .Line($"property {type} y").Line($"property {type} z").Record((type, x), (type, 1), (type, 2)).Make();
        CloudHeader far = Inspect(Vertex("binary_little_endian", "float", 600000.3));
        Assert.True(far.FloatCoordinates);
        Assert.Contains(far.Problems, p => p.Contains("0.0625", StringComparison.Ordinal));
        CloudHeader near = Inspect(Vertex("binary_little_endian", "float", 100));
        Assert.True(near.FloatCoordinates);
        Assert.Empty(near.Problems);
        Assert.False(Inspect(Vertex("binary_little_endian", "double", 600000.3)).FloatCoordinates);
        Assert.Contains(Inspect(Vertex("ascii", "float", 600000.3)).Problems, p => p.Contains("32-bit", StringComparison.Ordinal));
        CloudHeader text = Inspect(Encoding.ASCII.GetBytes("ply\nformat ascii 1.0\nelement vertex 1\nproperty float x\nproperty float y\nproperty float z\nend_header\n600000.337 6600000.128 12.5\n"));
        Assert.False(text.FloatCoordinates);
        Assert.Empty(text.Problems);
    }

    [Theory]
    [InlineData("1,5 2 3", "not a number")]
    [InlineData("1 2", "fewer values")]
    [InlineData("1 2 3 4", "more values")]
    [InlineData("", "ends within")]
    [InlineData("a b c", "not a number")]
    [InlineData("1 2 000000000000000000000000000000000000000000000000000000000000000000000000001", "not a number")]
    public void Bad_lines_are_refused_with_their_number(string line, string word)
    {
        byte[] file = Encoding.ASCII.GetBytes($"ply\nformat ascii 1.0\nelement vertex 2\nproperty double x\nproperty double y\nproperty double z\nend_header\n1.000000 2 3\n{line}\n");
        string message = Assert.Throws<InputException>(() => Read(file)).Message;
        Assert.Contains(word, message, StringComparison.Ordinal);
        if (line.Length > 0) Assert.Contains("line 9", message, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("nan", double.NaN)]
    [InlineData("-nan(ind)", double.NaN)]
    [InlineData("NaN", double.NaN)]
    [InlineData("-inf", double.NegativeInfinity)]
    [InlineData("1.#INF", double.PositiveInfinity)]
    [InlineData("1e5", 1e5)]
    [InlineData("-.5", -0.5)]
    [InlineData("+7.", 7)]
    [InlineData("0.1", 0.1)]
    [InlineData("123456789.123456789", 123456789.123456789)]
    [InlineData("9007199254740993", 9007199254740992)]
    public void Numbers_in_text_are_read_as_the_language_reads_them(string text, double expected)
    {
        byte[] file = Encoding.ASCII.GetBytes($"ply\nformat ascii 1.0\nelement vertex 1\nproperty double x\nproperty double y\nproperty double z\nend_header\n{text}\t2  3 \n");
        Assert.Equal(expected, Read(file).X[0]);
    }

    [Fact]
    public void Plain_decimals_round_as_the_library_rounds_them()
    {
        var rng = new Random(5);
        var lines = new StringBuilder();
        var expected = new List<double>();
        const int n = 20_000;
        for (int i = 0; i < n; i++)
        {
            string text = $"{(rng.Next(2) == 0 ? "-" : "")}{rng.NextInt64(1L << rng.Next(1, 36))}.{rng.Next(1_000_000):000000}";
            expected.Add(double.Parse(text, System.Globalization.CultureInfo.InvariantCulture));
            lines.Append(text).Append(" 0 0\n");
        }
        byte[] file = Encoding.ASCII.GetBytes($"ply\nformat ascii 1.0\nelement vertex {n}\nproperty double x\nproperty double y\nproperty double z\nend_header\n{lines}");
        Assert.Equal(expected, Read(file).X);
    }

    [Theory]
    [InlineData("element vertex 4000000000\nproperty float x\nproperty float y\nproperty float z\n", "cut short")]
    [InlineData("element vertex 9223372036854775807\nproperty double x\nproperty double y\nproperty double z\n", "cut short")]
    [InlineData("element vertex 1\nproperty float x\nproperty float y\nproperty float w\n", "lack a coordinate")]
    [InlineData("element point 1\nproperty float x\n", "no vertex element")]
    [InlineData("element vertex 1\nproperty half x\n", "not understood")]
    [InlineData("element vertex 1\nproperty list float int x\n", "not understood")]
    [InlineData("element vertex many\n", "name and a count")]
    [InlineData("property float x\n", "before the first element")]
    [InlineData("elephant\n", "not understood")]
    [InlineData("element vertex 5\n", "no properties")]
    public void Bad_headers_are_refused(string lines, string word)
    {
        foreach (string encoding in Encodings)
        {
            byte[] file = Encoding.ASCII.GetBytes($"ply\nformat {encoding} 1.0\n{lines}end_header\n0000000000000");
            Assert.Contains(word, Assert.Throws<InputException>(() => Read(file)).Message, StringComparison.Ordinal);
        }
    }

    [Fact]
    public void Headers_without_end_or_format_are_refused()
    {
        Assert.Contains("end_header", Assert.Throws<InputException>(() => Read("ply\nformat ascii 1.0\n"u8.ToArray())).Message, StringComparison.Ordinal);
        Assert.Contains("format", Assert.Throws<InputException>(() => Read("ply\nend_header\n"u8.ToArray())).Message, StringComparison.Ordinal);
        byte[] endless = new byte[3 << 20];
        "ply\n"u8.CopyTo(endless);
        Assert.Throws<InputException>(() => Read(endless));
    }

    private static CloudPoints Read(byte[] bytes)
    {
        using var file = new CloudFile("a.ply", bytes);
        return CloudFile.Points(file.Path, new MeshSampling { Least = 100, Most = 1000 });
    }

    private static CloudHeader Inspect(byte[] bytes)
    {
        using var file = new CloudFile("a.ply", bytes);
        return CloudFiles.Inspect(file.Path);
    }
}
