using System.Buffers.Binary;
using System.Text;
using CloudStruct.Formats;
using CloudStruct.Formats.Bytes;
using CloudStruct.Formats.Las;
using CloudStruct.Formats.Laz;
using CloudStruct.Products.Clouds;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;

namespace CloudStruct.Tests.Products.Clouds;

public class ClassifiedCloudWriterTests
{
    // Offsets are those of the LAS Specification 1.4 R16 (ASPRS): public header block, point data record format 7.
    // Extra bytes follow the 36 bytes of a record: face_id 4, roughness_m 4, dike_probability 1, source_class 1.
    private const int Standard = 36, Record = 46;

    [Fact]
    public void Every_point_carries_what_its_nearest_working_point_has()
    {
        byte[] las = WriteAll();
        Assert.Equal("LASF", Encoding.ASCII.GetString(las, 0, 4));
        Assert.Equal((1, 4, 7), (las[24], las[25], las[104]));
        Assert.Equal(Record, BinaryPrimitives.ReadUInt16LittleEndian(las.AsSpan(105)));
        Assert.Equal(7UL, BinaryPrimitives.ReadUInt64LittleEndian(las.AsSpan(247)));

        // Working points 0 to 3: host on face 1, dike on face 2, cover, host on face 1. The last two points are stray.
        Assert.Equal(new[] { 64, 64, 65, 66, 64, 1, 1 }, Points(las, r => (int)r[16]));
        Assert.Equal(new uint[] { 1, 1, 2, 0, 1, 0, 0 }, Points(las, r => BinaryPrimitives.ReadUInt32LittleEndian(r[Standard..])));
        Assert.Equal(new[] { 0.01f, 0.01f, 0.02f, float.NaN, 0.04f, float.NaN, float.NaN }, Points(las, r => BinaryPrimitives.ReadSingleLittleEndian(r[(Standard + 4)..])));
        Assert.Equal(new[] { 3, 3, 250, 10, 0, 0, 0 }, Points(las, r => (int)r[Standard + 8]));
        Assert.Equal(new[] { 2, 3, 4, 5, 6, 7, 8 }, Points(las, r => (int)r[Standard + 9]));
    }

    [Fact]
    public void Coordinates_are_those_of_the_map_to_the_millimetre()
    {
        byte[] las = WriteAll();
        double At(ReadOnlySpan<byte> r, int axis) => (BinaryPrimitives.ReadInt32LittleEndian(r[(4 * axis)..])
            * BinaryPrimitives.ReadDoubleLittleEndian(las.AsSpan(131 + (8 * axis)))) + BinaryPrimitives.ReadDoubleLittleEndian(las.AsSpan(155 + (8 * axis)));
        Assert.True(BinaryPrimitives.ReadDoubleLittleEndian(las.AsSpan(131)) <= 0.001);
        (double, double, double)[] places = [.. Points(las, r => (Math.Round(At(r, 0), 6), Math.Round(At(r, 1), 6), Math.Round(At(r, 2), 6)))];
        Assert.Equal((512300.5, 4178900.5, 1200.5), places[0]);
        Assert.Equal((512301.4, 4178900.6, 1200.5), places[2]);
        Assert.Equal((512270.0, 4178900.5, 1200.5), places[6]);
    }

    [Fact]
    public void Colour_of_8_bits_is_stored_times_256()
    {
        // LAS 1.4 R16, point data record format 7: "normalized to 16-bit" by multiplying 8-bit values by 256.
        byte[] las = WriteAll();
        Assert.Equal(new[] { 0, 256, 512, 768, 1024, 1280, 1536 }, Points(las, r => (int)BinaryPrimitives.ReadUInt16LittleEndian(r[30..])));
        Assert.Equal(65280, Points(las, r => (int)BinaryPrimitives.ReadUInt16LittleEndian(r[34..]))[0]);
    }

    [Fact]
    public void The_header_holds_the_date_of_the_input_and_no_other()
    {
        byte[] las = WriteAll();
        Assert.Equal((ushort)165, BinaryPrimitives.ReadUInt16LittleEndian(las.AsSpan(90)));   // 14 June: 31+28+31+30+31+14
        Assert.Equal((ushort)2025, BinaryPrimitives.ReadUInt16LittleEndian(las.AsSpan(92)));
    }

    [Fact]
    public void Extra_columns_are_named_and_typed()
    {
        string header = Encoding.Latin1.GetString(WriteAll());
        foreach (string name in new[] { "face_id", "roughness_m", "dike_probability", "source_class" })
            Assert.Contains(name + "\0", header, StringComparison.Ordinal);
    }

    [Fact]
    public void A_system_in_feet_is_not_named_because_the_file_is_in_metres()
    {
        const string wkt = "PROJCS[\"somewhere\"]";
        Assert.Contains("somewhere", Encoding.Latin1.GetString(Write(new CrsInfo { Wkt = wkt })), StringComparison.Ordinal);
        Assert.DoesNotContain("somewhere", Encoding.Latin1.GetString(Write(new CrsInfo { Wkt = wkt, HorizontalUnitM = 0.3048, VerticalUnitM = 0.3048 })), StringComparison.Ordinal);
    }

    [Fact]
    public void Blocks_of_any_length_and_any_threads_give_the_same_file()
    {
        var random = new Random(3);
        float[][] points = [.. Enumerable.Range(0, 20_000).Select(_ => new[] { 4 * random.NextSingle(), random.NextSingle(), random.NextSingle() })];
        byte[] One(int block, int threads)
        {
            using var stream = new MemoryStream();
            ClassifiedCloudWriter.WriteAll(stream, Samples.Dike(), new SamplePieces(points, Samples.Dike().Intake, block), Samples.Facts(), StageContext.Plain(threads: threads));
            return stream.ToArray();
        }
        byte[] expected = One(20_000, 1);
        Assert.Equal(expected, One(20_000, 4));
        Assert.Equal(expected, One(777, 2));

        // Slow twin: the nearest of four points by trying all; points within a hair of the border may go either way.
        uint[] faces = Points(expected, r => BinaryPrimitives.ReadUInt32LittleEndian(r[Standard..]));
        uint[] truth = [1, 2, 0, 1];
        for (int i = 0; i < points.Length; i++)
        {
            float x = points[i][0];
            if (Math.Abs(x - Math.Round(x)) > 1e-6) Assert.Equal(truth[(int)x], faces[i]);
        }
    }

    [Fact]
    public void The_compressed_cloud_holds_the_same_points_and_columns()
    {
        byte[] las = WriteAll();
        using var stream = new MemoryStream();
        ClassifiedCloudWriter.WriteAll(stream, Samples.Dike(), SamplePieces.AboutTheDike(), Samples.Facts(), StageContext.Plain(), compressed: true);
        using var scratch = new Scratch();
        string path = scratch["classified.laz"];
        File.WriteAllBytes(path, stream.ToArray());
        using var file = new FileBytes(path);
        LasHeader header = LasHeaderReader.Read(file);
        Assert.Equal((4, 7, Record, 7L), (header.Minor, header.PointFormat, header.RecordBytes, header.Declared));
        byte[] records = [.. new LazPoints(file, header.Laz!, header.PointsAt, header.Declared).Read(CancellationToken.None).SelectMany(run => run.Records[..(run.Count * Record)])];
        Assert.Equal(las[(int)BinaryPrimitives.ReadUInt32LittleEndian(las.AsSpan(96))..], records);
        CloudHeader told = CloudFiles.Open(path).Header;
        Assert.Equal(7, told.Points);
        Assert.Empty(told.Problems);
        foreach (string name in new[] { "face_id", "roughness_m", "dike_probability", "source_class" })
            Assert.Contains(told.Facts, f => f.Value.Contains(name, StringComparison.Ordinal));
    }

    [Fact]
    public void The_thinned_cloud_holds_the_working_points()
    {
        using var stream = new MemoryStream();
        ClassifiedCloudWriter.WriteThinned(stream, Samples.Dike(), Samples.Facts());
        byte[] las = stream.ToArray();
        Assert.Equal(new[] { 64, 65, 66, 64 }, Points(las, r => (int)r[16]));
        Assert.Equal(new[] { 2, 2, 5, 2 }, Points(las, r => (int)r[Standard + 9]));
    }

    private static byte[] WriteAll() => Write(CrsInfo.None);

    private static byte[] Write(CrsInfo crs)
    {
        Findings f = Samples.Dike();
        f = f with { Intake = f.Intake with { Frame = f.Intake.Frame with { Crs = crs } } };
        using var stream = new MemoryStream();
        ClassifiedCloudWriter.WriteAll(stream, f, SamplePieces.AboutTheDike(), Samples.Facts(), StageContext.Plain());
        return stream.ToArray();
    }

    private delegate T Reads<out T>(ReadOnlySpan<byte> record);

    private static T[] Points<T>(byte[] las, Reads<T> read)
    {
        int at = (int)BinaryPrimitives.ReadUInt32LittleEndian(las.AsSpan(96)), count = (int)BinaryPrimitives.ReadUInt64LittleEndian(las.AsSpan(247));
        var values = new T[count];
        for (int i = 0; i < count; i++) values[i] = read(las.AsSpan(at + (i * Record), Record));
        return values;
    }
}
