using CloudStruct.Formats;
using CloudStruct.Formats.Bytes;
using CloudStruct.Formats.Las;
using CloudStruct.Formats.Laz;

namespace CloudStruct.Tests.Formats.Las;

/// <summary>A compressed file against its plain twin: same records to the byte, same header but for what compression changes.</summary>
public class LasWriterCompressedTests
{
    private static readonly LasExtra[] Extras = [new("face_id", LasExtraType.UInt32, ""), new("roughness_m", LasExtraType.Float32, ""), new("dike_probability", LasExtraType.UInt8, "")];

    [Theory]
    [InlineData(4, true, 120_001)]
    [InlineData(4, false, 50_000)]
    [InlineData(2, true, 50_001)]
    [InlineData(2, false, 7)]
    [InlineData(4, true, 0)]
    public void Records_are_those_of_the_plain_file(int minor, bool colour, int count)
    {
        byte[] plain = Written(minor, colour, count, false, 1), packed = Written(minor, colour, count, true, 1);
        Assert.Equal(packed, Written(minor, colour, count, true, 3));
        (LasHeader a, byte[] expected) = Read("a.las", plain);
        (LasHeader b, byte[] records) = Read("a.laz", packed);
        Assert.Equal(expected.Length, (long)count * a.RecordBytes);
        Assert.Equal(expected, records);
        Assert.Equal((a.Minor, a.PointFormat, a.RecordBytes, a.Declared, a.Scale, a.Offset, a.Min, a.Max), (b.Minor, b.PointFormat, b.RecordBytes, b.Declared, b.Scale, b.Offset, b.Min, b.Max));
        Assert.Empty(b.Problems);
        Assert.Equal(128 | a.PointFormat, packed[104]);
        Assert.Equal(50_000u, b.Laz!.ChunkPoints);
        if (count > 1000) Assert.True(packed.Length < plain.Length / 2);
    }

    [Fact]
    public void The_table_stands_after_the_points_and_ends_the_file()
    {
        byte[] packed = Written(4, true, 120_001, true, 2);
        using var file = new CloudFile("a.laz", packed);
        using var bytes = new FileBytes(file.Path);
        LasHeader las = LasHeaderReader.Read(bytes);
        ChunkTable.Entry[] table = ChunkTable.Read(bytes, las.Laz!, las.PointsAt, las.Declared)!;
        Assert.Equal([50_000L, 50_000, 20_001], table.Select(e => e.Points));
        Assert.Equal(BitConverter.ToInt64(packed, (int)las.PointsAt), table[^1].At + table[^1].Bytes);
        Assert.Equal(packed[(int)(table[^1].At + table[^1].Bytes)..], ChunkTable.Bytes([.. table.Select(e => ((int)e.Points, (int)e.Bytes))], false));
    }

    [Fact]
    public void A_file_may_begin_anywhere_in_a_stream()
    {
        using var stream = new MemoryStream();
        stream.Write(new byte[1000]);
        Fill(stream, 4, true, 300, true, 1);
        Assert.Equal(Written(4, true, 300, true, 1), stream.ToArray()[1000..]);
    }

    // Batches that do not fit chunks.
    private static byte[] Written(int minor, bool colour, int count, bool compressed, int threads)
    {
        using var stream = new MemoryStream();
        Fill(stream, minor, colour, count, compressed, threads);
        return stream.ToArray();
    }

    private static void Fill(Stream stream, int minor, bool colour, int count, bool compressed, int threads)
    {
        var random = new Random(count);
        using var writer = new LasWriter(stream, new LasLayout { Minor = minor, HasColour = colour, Wkt = minor == 4 ? "LOCAL_CS[\"x\"]" : "", Offset = new(600000, 6600000, 0), Extras = Extras, Compressed = compressed }, threads);
        for (int from = 0; from < count; from += 33_333)
        {
            int n = Math.Min(33_333, count - from);
            int[] i = [.. Enumerable.Range(from, n)];
            ushort Shade(int k) => (ushort)((100 + (k % 7) + random.Next(9)) << 8);
            writer.Write(new LasBatch
            {
                Count = n,
                X = i.Select(k => 600000 + (0.02 * (k % 400)) + (0.005 * random.NextDouble())).ToArray(),
                Y = i.Select(k => 6600000 + (0.02 * (k / 400)) + (0.005 * random.NextDouble())).ToArray(),
                Z = i.Select(k => 10 + (0.005 * random.NextDouble())).ToArray(),
                Red = i.Select(Shade).ToArray(), Green = i.Select(Shade).ToArray(), Blue = i.Select(Shade).ToArray(),
                Class = i.Select(k => (byte)(minor == 2 ? 1 + (k / 90 % 3) : 64 + (k / 90 % 3))).ToArray(),
                Extra = [i.Select(k => (uint)(k / 500 * 977)).ToArray(), i.Select(k => k % 50 == 0 ? float.NaN : 0.004f).ToArray(), i.Select(k => (byte)random.Next(3)).ToArray()],
            });
        }
    }

    private static (LasHeader Header, byte[] Records) Read(string name, byte[] bytes)
    {
        using var file = new CloudFile(name, bytes);
        using var source = new FileBytes(file.Path);
        LasHeader las = LasHeaderReader.Read(source);
        if (las.Laz is null) return (las, bytes[(int)las.PointsAt..]);
        var all = new List<byte>();
        foreach ((byte[] records, int n) in new LazPoints(source, las.Laz, las.PointsAt, las.Declared).Read(CancellationToken.None)) all.AddRange(records.AsSpan(0, n * las.RecordBytes));
        return (las, [.. all]);
    }
}
