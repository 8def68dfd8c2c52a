using System.Globalization;
using System.Text;
using CloudStruct.Formats;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Formats.Las;

public class LasReaderTests
{
    // LAS 1.4 R16, "PDRF, minimum length 0..10" of testdata/reference/las_facts.csv.
    private static readonly int[] Minimum = [.. Fact("minimum length 0..10").Split(' ').Select(n => int.Parse(n, CultureInfo.InvariantCulture))];

    [Fact]
    public void Every_point_format_is_read_at_its_minimum_length_and_refused_below()
    {
        Assert.Equal(11, Minimum.Length);
        for (int format = 0; format <= 10; format++)
        {
            var las = new LasBytes { Minor = 4, Format = format, RecordBytes = Minimum[format], Points = 3, Fill = (i, r) => LasBytes.I32(r, 0, 100 * i) };
            CloudPoints points = Read(las.Make());
            Assert.Equal([1000, 1001, 1002], points.X);
            byte[] shorter = new LasBytes { Minor = 4, Format = format, RecordBytes = Minimum[format] - 1 }.Make();
            Assert.Contains("record is too short", Refusal(shorter), StringComparison.Ordinal);
        }
    }

    // "PDRF, RGB offset": PDRF2 20; PDRF3 28; PDRF5 28; PDRF7 30; PDRF8 30 (+NIR 36).
    [Theory]
    [InlineData(2, 20)]
    [InlineData(3, 28)]
    [InlineData(5, 28)]
    [InlineData(7, 30)]
    [InlineData(8, 30)]
    [InlineData(10, 30)]
    public void Colour_stands_where_the_standard_says(int format, int at)
    {
        if (format != 10) Assert.Contains($"PDRF{format} {at}", Fact("RGB offset"), StringComparison.Ordinal);
        CloudPoints points = Read(new LasBytes
        {
            Minor = 4, Format = format, RecordBytes = Minimum[format],
            Fill = (_, r) => { LasBytes.U16(r, at, 65535); LasBytes.U16(r, at + 2, 256); LasBytes.U16(r, at + 4, 7); },
        }.Make());
        Assert.Equal((65535, 256, 7), (points.Red[0], points.Green[0], points.Blue[0]));
    }

    // Formats 0-5: class in the low 5 bits, bit 7 withheld. 6-10: whole byte at 16, withheld bit 2 of byte 15.
    [Theory]
    [InlineData(0, 15, 0x7F, 31, false)]
    [InlineData(3, 15, 0x82, 2, true)]
    [InlineData(6, 16, 0xC8, 200, false)]
    [InlineData(7, 16, 0x41, 65, false)]
    public void Class_and_withheld_flag_follow_the_format(int format, int at, int value, int expected, bool withheld)
    {
        CloudPoints points = Read(new LasBytes { Minor = 4, Format = format, RecordBytes = Minimum[format], Fill = (_, r) => r[at] = (byte)value }.Make());
        Assert.Equal(withheld ? [] : [(byte)expected], points.Class);
        Assert.Equal(withheld ? 1 : 0, points.Withheld);
    }

    [Fact]
    public void Deleted_points_are_left_out_and_counted_whatever_the_block()
    {
        CloudPoints points = Read(new LasBytes
        {
            Minor = 4, Format = 7, RecordBytes = 41, Points = 150_000,
            Fill = (i, r) => { LasBytes.I32(r, 0, i); LasBytes.U16(r, 30, i & 0xFFFF); r[15] = (byte)(i % 3 == 0 ? 4 : 8); r[16] = (byte)(i & 255); },
        }.Make());
        Assert.Equal(50_000, points.Withheld);
        Assert.Equal(100_000, points.Count);
        for (int i = 0, k = 0; i < 150_000; i++)
        {
            if (i % 3 == 0) continue;
            Assert.Equal((1000 + (i * 0.01), (ushort)(i & 0xFFFF), (byte)(i & 255)), (points.X[k], points.Red[k], points.Class[k]));
            k++;
        }
    }

    [Theory]
    [InlineData(0, 3u, 0ul, 3, "old 32-bit")]
    [InlineData(7, 0u, 3ul, 3, "")]
    [InlineData(0, 2u, 3ul, 3, "disagree")]
    public void Both_numbers_of_points_are_understood(int format, uint legacy, ulong wide, int expected, string word)
    {
        byte[] file = new LasBytes { Minor = 4, Format = format, RecordBytes = 36, Points = 3 }.Make(f => { LasBytes.U32(f, 107, legacy); LasBytes.U64(f, 247, wide); });
        CloudHeader header = Inspect(file);
        Assert.Equal(expected, header.Points);
        Assert.Equal(word.Length > 0, header.Problems.Any(p => p.Contains(word, StringComparison.Ordinal) && word.Length > 0));
        Assert.Equal(expected, Read(file).Count);
    }

    [Fact]
    public void Extended_records_after_the_points_give_the_coordinate_system()
    {
        byte[] wkt = Encoding.UTF8.GetBytes("PROJCS[\"mine\",GEOGCS[\"g\",DATUM[\"d\",SPHEROID[\"s\",6378137,298.257]],PRIMEM[\"Greenwich\",0],UNIT[\"degree\",0.0174532925199433]],PROJECTION[\"Transverse_Mercator\"],PARAMETER[\"central_meridian\",9],UNIT[\"foot\",0.3048]]\0");
        byte[] evlr = new byte[60 + wkt.Length];
        "LASF_Projection"u8.CopyTo(evlr.AsSpan(2));
        LasBytes.U16(evlr, 18, 2112);
        LasBytes.U64(evlr, 20, (ulong)wkt.Length);
        wkt.CopyTo(evlr, 60);
        var las = new LasBytes { Minor = 4, Format = 6, RecordBytes = 30, Points = 5, Encoding = 16, AfterPoints = evlr };
        CloudHeader header = Inspect(las.Make(f => { LasBytes.U64(f, 235, (ulong)(las.PointsAt + 150)); LasBytes.U32(f, 243, 1); }));
        Assert.Equal(("mine", 0.3048), (header.Crs.Name, header.Crs.HorizontalUnitM));
        Assert.Empty(header.Problems);
        CloudHeader astray = Inspect(las.Make(f => { LasBytes.U64(f, 235, ulong.MaxValue); LasBytes.U32(f, 243, uint.MaxValue); }));
        Assert.Contains(astray.Problems, p => p.Contains("outside the file", StringComparison.Ordinal));
        CloudHeader endless = Inspect(las.Make(f => { LasBytes.U64(f, 235, (ulong)(las.PointsAt + 150)); LasBytes.U32(f, 243, 1); LasBytes.U64(f, las.PointsAt + 150 + 20, ulong.MaxValue); }));
        Assert.Contains(endless.Problems, p => p.Contains("past the end", StringComparison.Ordinal));
    }

    [Fact]
    public void Facts_name_extra_columns()
    {
        CloudHeader header = CloudFiles.Inspect(Repo.Path("testdata/las/pd_extrabytes.las"));
        string[] extras = [.. header.Facts.Where(f => f.Name == "extra_column").Select(f => f.Value)];
        Assert.Equal(["Colors: 3 x uint16", "Reserved: undocumented", "Flags: 2 x int8", "Intensity: uint32", "Time: uint64"],
            extras.Select(e => e.Split(',')[0]));
        Assert.Contains(CloudFiles.Inspect(Repo.Path("testdata/las/lp_unregistered_extra_bytes.las")).Facts, f => f is { Name: "extra_bytes_undescribed", Value: "4 a point" });
    }

    // The keys say EPSG:2229 and vertical unit 9003: US survey feet across and up (testdata/README.md).
    [Fact]
    public void Feet_are_read_from_keys()
    {
        CrsInfo crs = CloudFiles.Inspect(Repo.Path("testdata/las/coloured-scan-feet-navd88.las")).Crs;
        Assert.Equal((CrsKind.Projected, 2229, 1200.0 / 3937.0, 1200.0 / 3937.0), (crs.Kind, crs.Epsg, crs.HorizontalUnitM, crs.VerticalUnitM));
        CrsInfo lambert = CloudFiles.Inspect(Repo.Path("testdata/las/pd_prec3.las")).Crs;
        Assert.Equal(0.3048, lambert.HorizontalUnitM);
        Assert.Equal("Lambert Conformal Conic", lambert.Method);
        Assert.NotEqual("", lambert.Wkt);
    }

    [Theory]
    [InlineData(24, 2, "version")]
    [InlineData(25, 6, "version")]
    [InlineData(95, 0, "impossible length")]
    [InlineData(104, 11, "does not exist")]
    [InlineData(104, 135, "compressed")]
    [InlineData(97, 255, "start outside")]
    public void Damaged_headers_are_refused(int at, int value, string word) =>
        Assert.Contains(word, Refusal(new LasBytes { Minor = 4, Format = 7, RecordBytes = 36 }.Make(f => f[at] = (byte)value)), StringComparison.Ordinal);

    [Fact]
    public void Unusable_scales_are_refused_and_nonsense_bounds_are_told()
    {
        var las = new LasBytes { Minor = 2, Format = 0, RecordBytes = 20 };
        foreach (double scale in (double[])[0, double.NaN, double.PositiveInfinity])
            Assert.Contains("scale", Refusal(las.Make(f => LasBytes.F64(f, 139, scale))), StringComparison.Ordinal);
        Assert.Contains("offset", Refusal(las.Make(f => LasBytes.F64(f, 155, double.NaN))), StringComparison.Ordinal);
        foreach (double max in (double[])[-5, double.NaN, 1e18])
        {
            CloudHeader header = Inspect(las.Make(f => LasBytes.F64(f, 179, max)));
            Assert.Null(header.Min);
            Assert.Contains(header.Problems, p => p.Contains("bounds", StringComparison.Ordinal));
        }
    }

    [Fact]
    public void A_file_cut_short_is_described_by_inspect_and_refused_by_open()
    {
        byte[] whole = new LasBytes { Minor = 2, Format = 0, RecordBytes = 20, Points = 10 }.Make();
        using var file = new CloudFile("cut.las", whole[..^5]);
        CloudHeader header = CloudFiles.Inspect(file.Path);
        Assert.Equal(9, header.Points);
        Assert.Contains(header.Problems, p => p.Contains("cut short: 10 points are declared, 9 are there", StringComparison.Ordinal));
        Assert.Contains("cut short", Assert.Throws<InputException>(() => CloudFiles.Open(file.Path)).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void A_compression_record_that_does_not_fit_is_refused_with_its_fact()
    {
        // A compressor's record without the mark in the point format, and too short.
        byte[] vlr = new byte[54];
        "laszip encoded"u8.CopyTo(vlr.AsSpan(2));
        LasBytes.U16(vlr, 18, 22204);
        Assert.Contains("0 bytes, 34 are the least", Refusal(new LasBytes { Minor = 2, Format = 0, RecordBytes = 20, Variable = vlr, VariableCount = 1 }.Make()), StringComparison.Ordinal);
        // The mark without the record.
        Assert.Contains("nothing says how", Refusal(new LasBytes { Minor = 2, Format = 128, RecordBytes = 20 }.Make()), StringComparison.Ordinal);
    }

    [Fact]
    public void Names_do_not_decide_what_a_file_is()
    {
        byte[] bytes = new LasBytes { Minor = 2, Format = 0, RecordBytes = 20 }.Make();
        using var asLaz = new CloudFile("a.laz", bytes);
        Assert.Contains(CloudFiles.Inspect(asLaz.Path).Problems, p => p.Contains(".laz", StringComparison.Ordinal));
        using var asPly = new CloudFile("a.PLY", bytes);
        Assert.Equal(1, CloudFiles.Inspect(asPly.Path).Points);
        using var upper = new CloudFile("A.LAS", bytes);
        Assert.Empty(CloudFiles.Inspect(upper.Path).Problems);
    }

    // Read twice: the same bytes under two versions of the standard (testdata/README.md).
    [Theory]
    [InlineData("pdrf9-1.4.las", "pdrf9-1.5.las")]
    [InlineData("pdrf10-1.4.las", "pdrf10-1.5.las")]
    public void Twins_of_two_versions_give_the_same_points(string one, string other)
    {
        CloudPoints a = CloudFile.Points(Repo.Path("testdata/las/" + one)), b = CloudFile.Points(Repo.Path("testdata/las/" + other));
        Assert.Equal(a.X, b.X);
        Assert.Equal(a.Z, b.Z);
        Assert.Equal(a.Red, b.Red);
        Assert.Equal(a.Class, b.Class);
    }

    [Fact]
    public void The_same_grid_of_ten_points_is_read_from_all_versions_and_formats()
    {
        string[] files = Directory.GetFiles(Repo.Path("testdata/las"), "grid_*.las");
        Assert.Equal(19, files.Length);
        CloudPoints first = CloudFile.Points(files[0]);
        foreach (string file in files)
        {
            CloudPoints p = CloudFile.Points(file);
            Assert.Equal(first.X, p.X);
            Assert.Equal(first.Y, p.Y);
            Assert.Equal(first.Z, p.Z);
            Assert.Equal(6676, CloudFiles.Inspect(file).Crs.Epsg);
        }
    }

    private static CloudPoints Read(byte[] bytes)
    {
        using var file = new CloudFile("a.las", bytes);
        return file.Points();
    }

    private static CloudHeader Inspect(byte[] bytes)
    {
        using var file = new CloudFile("a.las", bytes);
        return CloudFiles.Inspect(file.Path);
    }

    private static string Refusal(byte[] bytes) => Assert.Throws<InputException>(() => Read(bytes)).Message;

    private static string Fact(string name) =>
        File.ReadLines(Repo.Path("testdata/reference/las_facts.csv")).Select(l => l.Split(',')).Single(c => c[1] == name)[2];
}
