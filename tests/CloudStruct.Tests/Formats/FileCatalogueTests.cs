using System.Globalization;
using System.Text.RegularExpressions;
using CloudStruct.Formats;
using CloudStruct.Formats.Meshes;
using CloudStruct.Formats.Ply;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Points;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Formats;

/// <summary>Every file of testdata is read whole, with the counts that an independent header reader found, or refused.</summary>
public partial class FileCatalogueTests
{
    // Without a vertex element or without z; a list that its lines do not hold; points cut short; header never completed.
    private static readonly string[] Refused =
    [
        "pd_no_vertex.ply", "tm_ply_empty_header.ply", "pd_sized_dims.ply", "pd_unsized_dims.ply", "as_issue623.ply",
        "garbage_nVariableLength.las", "kv_glb_valid.glb", "dr_Box_draco_required-extension.glb", "lg_BoxTextured_meshopt_required-extension.glb",
    ];

    public static TheoryData<string, string> Files()
    {
        var files = new TheoryData<string, string>();
        string folder = "";
        foreach (string line in File.ReadLines(Repo.Path("testdata/README.md")))
        {
            if (line.StartsWith("## `", StringComparison.Ordinal)) folder = line.Trim('#', ' ', '`', '/');
            Match row = Row().Match(line);
            if (row.Success && folder is "las" or "ply" or "broken" or "laz" or "gltf") files.Add(folder + "/" + row.Groups[1].Value, row.Groups[2].Value);
        }
        return files;
    }

    [Fact]
    public void The_readme_lists_every_file()
    {
        string[] listed = [.. Files().Select(f => (string)f[0]).Order(StringComparer.Ordinal)];
        string[] there = [.. new[] { "las", "ply", "broken", "laz", "gltf" }.SelectMany(d => Directory.GetFiles(Repo.Path("testdata/" + d))
            .Select(f => d + "/" + Path.GetFileName(f))).Order(StringComparer.Ordinal)];
        Assert.Equal(there, listed);
        Assert.True(there.Length > 120);
    }

    [Theory]
    [MemberData(nameof(Files))]
    public void A_file_is_read_whole_or_refused(string name, string facts)
    {
        string path = Repo.Path("testdata/" + name);
        if (Refused.Contains(Path.GetFileName(name)))
        {
            var e = Assert.Throws<InputException>(() => CloudFile.Points(path));
            Assert.StartsWith(Path.GetFileName(name), e.Message, StringComparison.Ordinal);
            return;
        }
        CloudHeader header = CloudFiles.Inspect(path);
        CloudPoints points = CloudFile.Points(path, new MeshSampling { Least = 1000, Most = 1000 });
        Match las = LasFacts().Match(facts);
        if (las.Success)
        {
            Assert.Equal($"{(name.EndsWith(".laz", StringComparison.Ordinal) ? "LAZ" : "LAS")} {las.Groups[1].Value}, point format {las.Groups[2].Value}", header.Format);
            long count = long.Parse(las.Groups[4].Value, NumberStyles.AllowThousands, CultureInfo.InvariantCulture);
            Assert.Equal(count, header.Points);
            Assert.Equal(count, points.Count + points.Withheld);
            if (las.Groups[3].Success) Assert.Contains(header.Facts, f => f.Name == "record_bytes" && f.Value == las.Groups[3].Value);
            Assert.Equal(header.HasColour, points.Red.Count == points.Count && (points.Count > 0 || facts.Contains("fields: yes", StringComparison.Ordinal)));
            return;
        }
        if (name.StartsWith("gltf/", StringComparison.Ordinal))
        {
            int indexed = int.Parse(TriangleFacts().Match(facts).Groups[1].Value, CultureInfo.InvariantCulture);
            if (indexed > 0 && !name.Contains("nested", StringComparison.Ordinal)) Assert.Equal(indexed, header.Triangles);   // a nested mesh is placed more than once
            Assert.InRange(points.Count, 999, 1000);
            return;
        }

        long vertices = long.Parse(VertexFacts().Match(facts).Groups[1].Value, CultureInfo.InvariantCulture);
        long faces = FaceFacts().Match(facts) is { Success: true } m ? long.Parse(m.Groups[1].Value, CultureInfo.InvariantCulture) : 0;
        Assert.Equal(faces, header.Triangles);
        Assert.Equal(faces > 0 ? 0 : vertices, header.Points);
        // Samples stand at even steps of area, so the last may fall to rounding of the sum.
        if (faces > 0) Assert.InRange(points.Count, 999, 1000);
        else Assert.Equal(vertices, points.Count);
    }

    // A reader that trusts a count would ask for gigabytes on some of the broken files.
    [Theory]
    [MemberData(nameof(Files))]
    public void No_file_costs_more_memory_than_its_size_justifies(string name, string facts)
    {
        Assert.NotEqual("", name + facts);
        string path = Repo.Path("testdata/" + name);
        Touch(path);   // pools and code are filled once
        long before = GC.GetAllocatedBytesForCurrentThread();
        Touch(path);
        long spent = GC.GetAllocatedBytesForCurrentThread() - before;
        // Models of a compressed file take megabytes whatever it holds, and its points are some five times its size.
        bool packed = name.EndsWith(".laz", StringComparison.Ordinal) || name.StartsWith("gltf/", StringComparison.Ordinal);
        long allowed = (packed ? 1 << 23 : 1 << 20) + ((packed ? 40 : 8) * new FileInfo(path).Length);
        Assert.True(spent <= allowed, $"{name}: {spent} bytes for a file of {new FileInfo(path).Length}");
    }

    private static void Touch(string path)
    {
        try
        {
            foreach (SourceBlock block in CloudFiles.Open(path, new MeshSampling { Least = 1000, Most = 1000 }).Read(CancellationToken.None)) block.Dispose();
        }
        catch (InputException)
        {
            // Refusing is fine; what counts is the memory.
        }
    }

    [GeneratedRegex(@"^\| `([^`]+)` \| \d+ \| (.*) \|$")]
    private static partial Regex Row();

    [GeneratedRegex(@"LAS (1\.\d), point format (\d+)(?:, record (\d+) B)?, ([\d,]+) points")]
    private static partial Regex LasFacts();

    [GeneratedRegex(@"(\d+) indexed triangles")]
    private static partial Regex TriangleFacts();

    [GeneratedRegex(@"vertex x(\d+)")]
    private static partial Regex VertexFacts();

    [GeneratedRegex(@"face x(\d+)")]
    private static partial Regex FaceFacts();
}
