using System.Numerics;
using CloudStruct.Formats.Meshes;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using static System.FormattableString;

namespace CloudStruct.Formats.Gltf;

/// <summary>A glTF model: its triangles sampled by area with the colour of their textures, its points as they are.</summary>
internal sealed class GltfSource : IPointSource
{
    private readonly string path;
    private readonly MeshSampling sampling;
    private readonly WeakReference<GltfModel> loaded;

    /// <summary>Opens a file.</summary>
    public GltfSource(string path, long bytes, MeshSampling sampling)
    {
        this.path = path;
        this.sampling = sampling;
        GltfModel model = GltfModel.Load(path);
        loaded = new WeakReference<GltfModel>(model);
        string name = Path.GetFileName(path);
        if (model.Mesh.Triangles == 0 && model.Points.Count == 0)
            throw new InputException(name, "the model has no triangles and no points", "an empty scene", "Export the model again");
        (Vec3? min, Vec3? max) = Bounds(model);
        Header = new CloudHeader
        {
            Name = name,
            Format = "glTF 2.0" + (model.Mesh.Triangles > 0 ? ", mesh" : ", points"),
            Bytes = bytes,
            Points = model.Mesh.Triangles > 0 ? 0 : model.Points.Count,
            Triangles = model.Mesh.Triangles,
            HasColour = HasColour(model),
            FloatCoordinates = true,
            Min = min,
            Max = max,
            Facts = [new HeaderFact("triangles", Invariant($"{model.Mesh.Triangles}")), new HeaderFact("points", Invariant($"{model.Points.Count}")), new HeaderFact("textures", Invariant($"{model.Images}")),
                new HeaderFact("axes", "y up in the file, turned to z up: east = x, north = -z")],
        };
    }

    /// <inheritdoc/>
    public CloudHeader Header { get; }

    /// <inheritdoc/>
    public IEnumerable<SourceBlock> Read(CancellationToken stop)
    {
        if (!loaded.TryGetTarget(out GltfModel? model)) loaded.SetTarget(model = GltfModel.Load(path));
        for (int from = 0; from < model.Points.Count; from += SourceBlock.Capacity)
        {
            stop.ThrowIfCancellationRequested();
            yield return Block(model, from, Math.Min(SourceBlock.Capacity, model.Points.Count - from));
        }

        if (model.Mesh.Triangles == 0) yield break;
        double area = MeshSampler.Area(model.Mesh);
        if (!(area > 0) || !double.IsFinite(area))
            throw new InputException(Header.Name, "the mesh has no area", Invariant($"{model.Mesh.Triangles} triangles, area {area}"), "Export the mesh again");
        TriangleMesh mesh = Header.HasColour && !model.Mesh.HasColour ? model.Mesh with { Paint = (_, _, _) => (ushort.MaxValue, ushort.MaxValue, ushort.MaxValue) } : model.Mesh;
        foreach (SourceBlock block in MeshSampler.Blocks(mesh, area, MeshSampler.Wanted(mesh, area, sampling), stop)) yield return block;
    }

    private static bool HasColour(GltfModel model) => model.Mesh.HasColour || model.PointsHaveColour;

    private SourceBlock Block(GltfModel model, int from, int count)
    {
        var block = new SourceBlock(Header.HasColour) { Count = count };
        for (int k = 0; k < count; k++)
        {
            (block.X[k], block.Y[k], block.Z[k], Vector4 colour) = model.Points[from + k];
            block.Class[k] = 0;
            if (!block.HasColour) continue;
            (block.Red[k], block.Green[k], block.Blue[k]) = (GltfPainter.Level(colour.X), GltfPainter.Level(colour.Y), GltfPainter.Level(colour.Z));
        }

        return block;
    }

    private static (Vec3? Min, Vec3? Max) Bounds(GltfModel model)
    {
        Vec3 min = new(double.PositiveInfinity, double.PositiveInfinity, double.PositiveInfinity), max = min * -1;
        void Take(double x, double y, double z)
        {
            min = new(Math.Min(min.X, x), Math.Min(min.Y, y), Math.Min(min.Z, z));
            max = new(Math.Max(max.X, x), Math.Max(max.Y, y), Math.Max(max.Z, z));
        }

        for (int i = 0; i < model.Mesh.X.Length; i++) Take(model.Mesh.X[i], model.Mesh.Y[i], model.Mesh.Z[i]);
        foreach ((double x, double y, double z, _) in model.Points) Take(x, y, z);
        return double.IsFinite(min.X + max.X) ? (min, max) : (null, null);
    }
}
