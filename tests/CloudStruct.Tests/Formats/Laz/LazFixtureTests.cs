using System.Globalization;
using System.Security.Cryptography;
using CloudStruct.Formats;
using CloudStruct.Formats.Bytes;
using CloudStruct.Formats.Las;
using CloudStruct.Formats.Laz;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Points;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Formats.Laz;

/// <summary>Files of the reference encoder decode to the byte: every point format, item version and way of chunking that is known.</summary>
public class LazFixtureTests
{
    private static string Folder => Repo.Path("testdata/laz-fixtures");

    public static TheoryData<string, int, string> Fixtures()
    {
        var rows = new TheoryData<string, int, string>();
        foreach (string line in File.ReadLines(Path.Combine(Folder, "manifest.tsv")).Skip(1))
        {
            string[] c = line.Split('\t');
            rows.Add(c[0], int.Parse(c[5], CultureInfo.InvariantCulture), c[7]);
        }

        return rows;
    }

    [Fact]
    public void There_are_thirty() => Assert.Equal(30, Fixtures().Count);

    /// <summary>SHA-256 of the uncompressed records, from the reference decoder.</summary>
    [Theory]
    [MemberData(nameof(Fixtures))]
    public void Records_come_out_to_the_byte(string name, int points, string sha)
    {
        byte[] records = Records(Path.Combine(Folder, name), out int count);
        Assert.Equal(points, count);
        Assert.Equal(File.ReadAllBytes(Path.Combine(Folder, Path.ChangeExtension(name, ".raw"))), records);
        Assert.Equal(sha, Convert.ToHexStringLower(SHA256.HashData(records)));
    }

    public static TheoryData<string> Twins() =>
        [.. Directory.GetFiles(Repo.Path("testdata/laz")).Select(f => Path.GetFileNameWithoutExtension(f)).Where(n => File.Exists(Repo.Path($"testdata/las/{n}.las"))).Order(StringComparer.Ordinal)];

    /// <summary>Files that stand compressed and plain at their source.</summary>
    [Theory]
    [MemberData(nameof(Twins))]
    public void A_compressed_file_holds_the_points_of_its_plain_twin(string name)
    {
        CloudPoints plain = CloudFile.Points(Repo.Path($"testdata/las/{name}.las")), packed = CloudFile.Points(Repo.Path($"testdata/laz/{name}.laz"));
        Assert.Equal(plain.X, packed.X);
        Assert.Equal(plain.Y, packed.Y);
        Assert.Equal(plain.Z, packed.Z);
        Assert.Equal(plain.Red, packed.Red);
        Assert.Equal(plain.Green, packed.Green);
        Assert.Equal(plain.Blue, packed.Blue);
        Assert.Equal(plain.Class, packed.Class);
    }

    [Fact]
    public void Twins_cover_point_formats_with_and_without_colour() => Assert.True(Twins().Count >= 12);

    // Any damage ends in a complaint or in points, never in a crash or without end. 30 files, a few hundred mutations each.
    [Theory]
    [MemberData(nameof(Fixtures))]
    public void Damage_is_told_or_survived(string name, int points, string sha)
    {
        Assert.NotEqual("", sha);
        byte[] whole = File.ReadAllBytes(Path.Combine(Folder, name));
        var random = new Random(points + name.Length);
        int refused = 0;
        for (int i = 0; i < 120; i++)
        {
            byte[] bytes = (byte[])whole.Clone();
            if (i % 6 == 0) bytes = bytes[..random.Next(230, bytes.Length)];
            else for (int k = 0; k <= i % 3; k++) bytes[random.Next(94, bytes.Length)] ^= (byte)(1 << random.Next(8));
            using var file = new CloudFile("a.laz", bytes);
            try
            {
                foreach (SourceBlock block in CloudFiles.Open(file.Path).Read(CancellationToken.None)) block.Dispose();
            }
            catch (InputException e)
            {
                Assert.StartsWith("a.laz", e.Message, StringComparison.Ordinal);
                refused++;
            }
        }

        Assert.True(refused > 20);
    }

    [Fact]
    public void A_damaged_chunk_is_named_with_its_points()
    {
        byte[] bytes = File.ReadAllBytes(Path.Combine(Folder, "p7_v3_eb4.laz"));
        // Chunk 2 of 3 begins behind the first: its count of points follows its raw record.
        int at = FindChunk(bytes, 1) + 40;
        bytes[at] ^= 1;
        using var file = new CloudFile("a.laz", bytes);
        InputException e = Assert.Throws<InputException>(() => CloudFile.Points(file.Path));
        Assert.Contains("chunk 2, points 101 to 200", e.Message, StringComparison.Ordinal);
    }

    private static int FindChunk(byte[] bytes, int chunk)
    {
        int at = BitConverter.ToInt32(bytes, 96) + 8;
        for (int i = 0; i < chunk; i++)
        {
            // Record of 40 bytes, count, 9 layers of the point, 1 of the colour, 4 of the extra bytes.
            int sum = 0;
            for (int k = 0; k < 14; k++) sum += BitConverter.ToInt32(bytes, at + 44 + (4 * k));
            at += 44 + 56 + sum;
        }

        return at;
    }

    private static byte[] Records(string path, out int count)
    {
        using var file = new FileBytes(path);
        LasHeader las = LasHeaderReader.Read(file);
        var all = new List<byte>();
        count = 0;
        foreach ((byte[] records, int n) in new LazPoints(file, las.Laz!, las.PointsAt, las.Declared).Read(CancellationToken.None))
        {
            all.AddRange(records.AsSpan(0, n * las.RecordBytes));
            count += n;
        }

        return [.. all];
    }
}
