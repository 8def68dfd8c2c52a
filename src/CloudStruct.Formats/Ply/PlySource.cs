using CloudStruct.Formats.Meshes;
using CloudStruct.Formats.Bytes;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Points;
using static System.FormattableString;

namespace CloudStruct.Formats.Ply;

/// <summary>A PLY cloud, or a PLY mesh sampled by area.</summary>
internal sealed class PlySource : IPointSource
{
    // A float step of more than this is worse than the noise of a good flight.
    private const double CoarsestStep = 0.002;

    private const int MostComments = 20, MostCommentLength = 160;

    private readonly string path;
    private readonly PlyHeader ply;
    private readonly PlyVertexLayout layout;
    private readonly MeshSampling sampling;
    private readonly double floatColourScale;

    // A mesh is needed whole each time its samples are read: kept while memory allows, so that it is loaded once as a rule.
    private readonly WeakReference<TriangleMesh> loaded = new(null!);

    /// <summary>Opens a file that starts with "ply".</summary>
    public PlySource(string path, FileBytes file, MeshSampling sampling)
    {
        this.path = path;
        this.sampling = sampling;
        ply = PlyHeaderReader.Read(file);
        layout = PlyVertexLayout.Of(ply);
        PlyPeek peek = PlyPeek.At(file, ply, layout);
        floatColourScale = peek.LargestColour <= 1 ? 65535 : 1;
        Header = Describe(peek);
    }

    /// <inheritdoc/>
    public CloudHeader Header { get; }

    private bool IsMesh => layout.Element.Count > 0 && ply.Faces is { Count: > 0 };

    /// <inheritdoc/>
    public IEnumerable<SourceBlock> Read(CancellationToken stop)
    {
        if (IsMesh)
        {
            TriangleMesh mesh = Mesh(stop);
            double area = MeshSampler.Area(mesh);
            if (!(area > 0) || !double.IsFinite(area))
                throw new InputException(ply.Name, "the mesh has no area", Invariant($"{mesh.Triangles} triangles, area {area}"), "Export the mesh again");
            foreach (SourceBlock block in MeshSampler.Blocks(mesh, area, MeshSampler.Wanted(mesh, area, sampling), stop)) yield return block;
            yield break;
        }
        using FileBytes file = Open();
        PlyCursor cursor = PlyCursor.Over(file, ply);
        foreach (PlyElement before in ply.Elements.TakeWhile(e => !ReferenceEquals(e, layout.Element))) cursor.SkipElement(before, stop);
        foreach (SourceBlock block in new PlyVertexReader(ply, layout, cursor, floatColourScale).Blocks(stop)) yield return block;
    }

    private TriangleMesh Mesh(CancellationToken stop)
    {
        if (loaded.TryGetTarget(out TriangleMesh? mesh)) return mesh;
        using FileBytes file = Open();
        mesh = PlyMeshReader.Read(file, ply, layout, floatColourScale, stop);
        loaded.SetTarget(mesh);
        return mesh;
    }

    private FileBytes Open()
    {
        var file = new FileBytes(path);
        if (file.Length == ply.FileBytes) return file;
        file.Dispose();
        throw new InputException(ply.Name, "the file changed while it was in use", Invariant($"{file.Length} bytes, {ply.FileBytes} when opened"),
            "Wait until it is fully written, then run again");
    }

    private CloudHeader Describe(PlyPeek peek)
    {
        var facts = new List<HeaderFact>();
        foreach (PlyElement e in ply.Elements)
            facts.Add(new HeaderFact("element", Invariant($"{e.Name}, {e.Count}: {string.Join(", ", e.Properties.Select(Shown))}")));
        foreach (string comment in ply.Comments.Take(MostComments))
            facts.Add(new HeaderFact("comment", comment.Length > MostCommentLength ? comment[..MostCommentLength] + "..." : comment));
        var problems = new List<string>();
        bool floats = layout.FloatCoordinates && !peek.FinerThanFloat;
        if (floats && FloatStep(peek.LargestCoordinate) is double step && step > CoarsestStep)
            problems.Add(Invariant($"Coordinates such as {peek.LargestCoordinate:0} are stored as 32-bit floats, which step by {step:0.####} there: detail is lost. Export doubles, or subtract an offset first."));
        if (IsMesh && !layout.HasColour && ply.Comments.Any(c => c.Contains("TextureFile", StringComparison.OrdinalIgnoreCase)))
            problems.Add("The mesh has its colour in a texture, which is not read; colour its vertices to use colour.");
        if (ply.Elements.Any(e => e.Name == "tristrips" && e.Count > 0))
            problems.Add("Triangle strips are not read; only vertices and faces are.");
        return new CloudHeader
        {
            Name = ply.Name,
            Format = "PLY " + ply.Encoding switch { PlyEncoding.Ascii => "ascii", PlyEncoding.LittleEndian => "binary little endian", _ => "binary big endian" }
                + (IsMesh ? ", mesh" : ""),
            Bytes = ply.FileBytes,
            Points = IsMesh ? 0 : layout.Element.Count,
            Triangles = IsMesh ? ply.Faces!.Count : 0,
            HasColour = layout.HasColour,
            FloatCoordinates = floats,
            Facts = [.. facts],
            Problems = [.. problems],
        };
    }

    private static double FloatStep(double v) => MathF.BitIncrement((float)v) - (float)v;

    private static string Shown(PlyProperty p) =>
        (p.IsList ? "list " : "") + p.Type.ToString().ToLowerInvariant() + " " + p.Name;
}
