using System.Buffers.Binary;
using System.Text;
using CloudStruct.Formats.Las;
using CloudStruct.Records.Frame;

namespace CloudStruct.Tests.Formats.Las;

/// <summary>Bytes of written files against LAS 1.4 R16 (offsets: testdata/reference/las_facts.csv).</summary>
public class LasWriterTests
{
    private static readonly LasExtra[] OurExtras =
    [
        new("face_id", LasExtraType.UInt32, "face, 0 none"), new("roughness_m", LasExtraType.Float32, "rms about the plane"),
        new("dike_probability", LasExtraType.UInt8, "0-255"), new("source_class", LasExtraType.UInt8, "class in the input"),
    ];

    [Fact]
    public void Header_of_a_14_file_stands_where_the_standard_says()
    {
        byte[] file = Written(new LasLayout { Wkt = "LOCAL_CS[\"x\"]", Date = new DateOnly(2024, 3, 1), Extras = OurExtras });
        Assert.Equal("LASF", Encoding.ASCII.GetString(file, 0, 4));
        Assert.Equal(1 << 4, U16(file, 6));                       // WKT bit
        Assert.Equal((1, 4), (file[24], file[25]));
        Assert.Equal((61, 2024), (U16(file, 90), U16(file, 92)));  // 1 March of a leap year is day 61
        Assert.Equal(375, U16(file, 94));
        Assert.Equal(2u, U32(file, 100));
        Assert.Equal((7, 36 + 10), (file[104], U16(file, 105)));
        Assert.Equal(0u, U32(file, 107));                         // legacy count must be 0 for formats 6 to 10
        Assert.Equal(3ul, U64(file, 247));
        Assert.Equal(3ul, U64(file, 255));
        Assert.Equal(U32(file, 96) + (3 * 46), (uint)file.Length);
        Assert.Equal(0ul, U64(file, 235));                        // no EVLR
        // Maximum before minimum on each axis.
        Assert.Equal([600002.5, 600000, 6600001, 6599998.75, 12, 10], Doubles(file, 179, 6));
    }

    [Fact]
    public void Records_and_descriptors_hold_what_was_given()
    {
        byte[] file = Written(new LasLayout { Wkt = "LOCAL_CS[\"x\"]", Extras = OurExtras });
        int wkt = 375;
        Assert.Equal("LASF_Projection", Text(file, wkt + 2, 16));
        Assert.Equal((2112, 14), (U16(file, wkt + 18), U16(file, wkt + 20)));
        Assert.Equal(0, file[wkt + 54 + 13]);                     // null-terminated
        int extra = wkt + 54 + 14;
        Assert.Equal("LASF_Spec", Text(file, extra + 2, 16));
        Assert.Equal((4, 4 * 192), (U16(file, extra + 18), U16(file, extra + 20)));
        Assert.Equal((5, "face_id", "face, 0 none"), (file[extra + 54 + 2], Text(file, extra + 54 + 4, 32), Text(file, extra + 54 + 160, 32)));
        Assert.Equal(9, file[extra + 54 + 192 + 2]);
        int point = (int)U32(file, 96) + 46;                      // the second
        Assert.Equal(65, file[point + 16]);
        Assert.Equal(0x11, file[point + 14]);                     // return 1 of 1
        Assert.Equal((2, 22, 65280), (U16(file, point + 30), U16(file, point + 32), U16(file, point + 34)));
        Assert.Equal(7u, U32(file, point + 36));
        Assert.Equal(0.25f, BinaryPrimitives.ReadSingleLittleEndian(file.AsSpan(point + 40)));
        Assert.Equal((200, 3), (file[point + 44], file[point + 45]));
    }

    [Fact]
    public void A_12_file_has_point_format_2_and_legacy_counts_and_keys()
    {
        byte[] file = Written(new LasLayout { Minor = 2, Epsg = 32632 }, classes: [1, 2, 3]);
        Assert.Equal((227, 2, 26), (U16(file, 94), file[104], U16(file, 105)));
        Assert.Equal((3u, 3u), (U32(file, 107), U32(file, 111)));
        Assert.Equal(0, U16(file, 6));
        Assert.Equal(34735, U16(file, 227 + 18));
        Assert.Equal(32632, U16(file, 227 + 54 + 30));
        Assert.Equal(0x09, file[(int)U32(file, 96) + 14]);        // return 1 of 1 in 3 bits each
    }

    [Fact]
    public void Nothing_that_cannot_be_stored_is_written()
    {
        Assert.Throws<ArgumentException>(() => Written(new LasLayout { Offset = new(-1e9, 0, 0) }));
        Assert.Throws<ArgumentException>(() => Written(new LasLayout { Minor = 2 }));   // class 64 needs 8 bits
        Assert.Throws<ArgumentException>(() => Written(new LasLayout { Extras = [new("a", LasExtraType.Int16, "")] }));
    }

    [Fact]
    public void A_layout_around_far_corners_can_store_them()
    {
        LasLayout layout = new LasLayout().Around(new(100000, 0, -1e7), new(5e6, 10, 1e7));
        Assert.Equal(new Vec3(2550000, 0, 0), layout.Offset);
        Assert.Equal(0.01, layout.Scale.X, 12);
        Assert.Equal(0.001, layout.Scale.Y, 12);
        Assert.Equal(0.01, layout.Scale.Z, 12);
    }

    [Fact]
    public void A_file_without_points_has_zero_extremes()
    {
        using var stream = new MemoryStream();
        using (new LasWriter(stream, new LasLayout())) { }
        Assert.Equal(new double[6], Doubles(stream.ToArray(), 179, 6));
        Assert.Equal(375, stream.Length);
    }

    private static byte[] Written(LasLayout layout, byte[]? classes = null)
    {
        using var stream = new MemoryStream();
        if (layout.Offset == default) layout = layout with { Offset = new(600000, 6600000, 0) };
        using (var writer = new LasWriter(stream, layout))
        {
            writer.Write(new LasBatch
            {
                Count = 3,
                X = new double[] { 600000, 600002.5, 600001 },
                Y = new double[] { 6600000, 6600001, 6599998.75 },
                Z = new double[] { 10, 12, 11 },
                Red = new ushort[] { 1, 2, 3 },
                Green = new ushort[] { 11, 22, 33 },
                Blue = new ushort[] { 0, 65280, 1 },
                Class = classes ?? [64, 65, 66],
                Extra = layout.Extras.Length == 0 ? [] : new Array[]
                {
                    new uint[] { 0, 7, 70000 }, new[] { 0.5f, 0.25f, float.NaN }, new byte[] { 0, 200, 255 }, new byte[] { 2, 3, 4 },
                }[..layout.Extras.Length],
            });
        }
        return stream.ToArray();
    }

    private static int U16(byte[] file, int at) => BinaryPrimitives.ReadUInt16LittleEndian(file.AsSpan(at));
    private static uint U32(byte[] file, int at) => BinaryPrimitives.ReadUInt32LittleEndian(file.AsSpan(at));
    private static ulong U64(byte[] file, int at) => BinaryPrimitives.ReadUInt64LittleEndian(file.AsSpan(at));
    private static string Text(byte[] file, int at, int length) => Encoding.ASCII.GetString(file, at, length).TrimEnd('\0');
    private static double[] Doubles(byte[] file, int at, int n) =>
        [.. Enumerable.Range(0, n).Select(i => BinaryPrimitives.ReadDoubleLittleEndian(file.AsSpan(at + (8 * i))))];
}
