using System.Globalization;
using CloudStruct.Formats.Bytes;
using CloudStruct.Formats.Las;
using CloudStruct.Formats.Laz;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Formats.Laz;

/// <summary>Chunks as the reference encoder writes them, to the byte, and back through the decoder.</summary>
public class LazEncoderTests
{
    private static string Folder => Repo.Path("testdata/laz-fixtures");

    // All but wave packets, version 1 and the scheme without chunks, which are read only.
    public static TheoryData<string, int, int, string, int> Fixtures()
    {
        var rows = new TheoryData<string, int, int, string, int>();
        foreach (string line in File.ReadLines(Path.Combine(Folder, "manifest.tsv")).Skip(1))
        {
            string[] c = line.Split('\t');
            int Number(int k) => int.Parse(c[k], CultureInfo.InvariantCulture);
            if (Number(1) is not (4 or 5 or 9 or 10) && Number(2) >= 2 && Number(3) >= 2) rows.Add(c[0], Number(1), Number(3), c[4], Number(6));
        }

        return rows;
    }

    [Fact]
    public void Twenty_five_of_the_fixtures_can_be_written() => Assert.Equal(25, Fixtures().Count);

    /// <summary>From the place of the table to the end of the file, and the compression record.</summary>
    [Theory]
    [MemberData(nameof(Fixtures))]
    public void The_points_of_a_fixture_are_written_to_the_byte(string name, int pointFormat, int version, string chunking, int recordBytes)
    {
        byte[] whole = File.ReadAllBytes(Path.Combine(Folder, name)), records = File.ReadAllBytes(Path.Combine(Folder, Path.ChangeExtension(name, ".raw")));
        bool differing = chunking == "variable";
        LazLayout layout = LazLayout.For(pointFormat, recordBytes, differing ? 0 : uint.Parse(chunking, CultureInfo.InvariantCulture));
        if (version == 4) layout = layout with { Items = [.. layout.Items.Select(i => i with { Version = 4 })] };

        int points = records.Length / recordBytes;
        int[] sizes = differing ? name.Contains("table_at_end", StringComparison.Ordinal) ? Counts(name) : [1, 120, 2, 177] : [.. Enumerable.Range(0, points).Chunk((int)layout.ChunkPoints).Select(c => c.Length)];
        Assert.Equal(points, sizes.Sum());
        var chunks = new List<(int Points, int Bytes)>();
        int pointsAt = BitConverter.ToInt32(whole, 96), at = pointsAt + 8, done = 0;
        foreach (int n in sizes)
        {
            byte[] chunk = LazChunkBytes.Of(layout, records.AsSpan(done * recordBytes, n * recordBytes));
            Assert.Equal(whole.AsSpan(at, chunk.Length).ToArray(), chunk);
            chunks.Add((n, chunk.Length));
            at += chunk.Length;
            done += n;
        }

        long place = BitConverter.ToInt64(whole, pointsAt);
        Assert.Equal(place == -1 ? BitConverter.ToInt64(whole, whole.Length - 8) : place, at);
        Assert.Equal(whole[at..(place == -1 ? ^8 : ^0)], ChunkTable.Bytes(chunks, differing));
        Assert.True(whole.AsSpan(0, pointsAt).IndexOf(layout.Write()) > 0);
    }

    public static TheoryData<int, int> Formats()
    {
        var rows = new TheoryData<int, int>();
        foreach (int format in new[] { 0, 1, 2, 3, 6, 7, 8 })
        {
            foreach (int extra in new[] { 0, 1, 10 }) rows.Add(format, extra);
        }

        return rows;
    }

    // Random bytes, small steps, and mixtures of both with runs in which nothing changes.
    [Theory]
    [MemberData(nameof(Formats))]
    public void What_is_written_is_read_back(int format, int extra)
    {
        int size = LasRecord.MinimumBytes(format) + extra;
        LazLayout layout = LazLayout.For(format, size);
        var random = new Random((100 * format) + extra);
        foreach (int count in new[] { 1, 2, 3, 50, 3000 })
        {
            for (int kind = 0; kind < 4; kind++)
            {
                byte[] records = Records(random, size, count, kind);
                byte[] chunk = LazChunkBytes.Of(layout, records);
                var decoder = new LazChunk(layout, chunk, 0, chunk.Length, count);
                byte[] back = new byte[records.Length];
                decoder.Read(back, count);
                decoder.CheckEnd();
                Assert.Equal(records, back);
                if (kind == 2 && count == 3000) Assert.True(chunk.Length < records.Length / 20);
            }
        }
    }

    // Times by their bits: neither the sign of a zero nor what a number that is none carries may be lost.
    [Theory]
    [InlineData(1, 20)]
    [InlineData(6, 22)]
    public void Times_that_compare_alike_stay_apart(int format, int timeAt)
    {
        int size = LasRecord.MinimumBytes(format);
        LazLayout layout = LazLayout.For(format, size);
        double[] times = [0.0, -0.0, 0.0, double.NaN, double.NaN, BitConverter.Int64BitsToDouble(0x7FF8000000000123), double.PositiveInfinity, -0.0, -0.0, double.MaxValue, double.MinValue, double.Epsilon, -double.Epsilon];
        foreach (double first in new[] { 5.0, double.NaN, -0.0 })
        {
            foreach (bool runs in new[] { false, true })
            {
                byte[] records = new byte[200 * size];
                var random = new Random(3);
                double now = first;
                for (int i = 0; i < 200; i++)
                {
                    if (i > 0 && (!runs || random.Next(5) == 0)) now = times[random.Next(times.Length)];
                    BitConverter.TryWriteBytes(records.AsSpan((i * size) + timeAt), now);
                }

                Assert.Equal(records, Back(layout, records));
                byte[] same = [.. Enumerable.Repeat(records[..size], 200).SelectMany(r => r)];
                Assert.Equal(same, Back(layout, same));
            }
        }
    }

    private static byte[] Back(LazLayout layout, byte[] records)
    {
        byte[] chunk = LazChunkBytes.Of(layout, records), back = new byte[records.Length];
        var decoder = new LazChunk(layout, chunk, 0, chunk.Length, records.Length / layout.RecordBytes);
        decoder.Read(back, records.Length / layout.RecordBytes);
        decoder.CheckEnd();
        return back;
    }

    private static byte[] Records(Random random, int size, int count, int kind)
    {
        byte[] records = new byte[count * size];
        random.NextBytes(records.AsSpan(0, size));
        for (int i = 1; i < count; i++)
        {
            Span<byte> now = records.AsSpan(i * size, size), before = records.AsSpan((i - 1) * size, size);
            before.CopyTo(now);
            switch (kind)
            {
                case 0:
                    random.NextBytes(now);
                    break;
                case 1:
                    now[0] = unchecked((byte)(now[0] + random.Next(-3, 4)));
                    now[random.Next(size)] ^= (byte)(1 << random.Next(8));
                    break;
                case 3 when random.Next(3) > 0:
                    int at = random.Next(size);
                    random.NextBytes(now.Slice(at, Math.Min(random.Next(1, 9), size - at)));
                    break;
            }
        }

        return records;
    }

    // This file does not say in the manifest how its points are shared out among chunks; its own table does.
    private static int[] Counts(string name)
    {
        using var file = new FileBytes(Path.Combine(Folder, name));
        LasHeader las = LasHeaderReader.Read(file);
        return [.. ChunkTable.Read(file, las.Laz!, las.PointsAt, las.Declared)!.Select(e => (int)e.Points)];
    }
}
