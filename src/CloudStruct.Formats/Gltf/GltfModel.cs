using System.Numerics;
using CloudStruct.Formats.Meshes;
using CloudStruct.Records.Complaints;
using SharpGLTF.Schema2;
using SharpGLTF.Validation;
using static System.FormattableString;

namespace CloudStruct.Formats.Gltf;

/// <summary>Triangles and points of a glTF 2.0 model, placed by its nodes, turned from y up to z up.</summary>
internal sealed class GltfModel
{
    private readonly List<double> x = [], y = [], z = [];
    private readonly List<int> corners = [];
    private readonly List<GltfPiece> pieces = [];

    private GltfModel()
    {
    }

    /// <summary>The triangles.</summary>
    public TriangleMesh Mesh { get; private set; } = new([], [], [], [], [], [], []);

    /// <summary>Single points: place and colour.</summary>
    public List<(double X, double Y, double Z, Vector4 Colour)> Points { get; } = [];

    /// <summary>Whether single points have colour.</summary>
    public bool PointsHaveColour { get; private set; }

    /// <summary>Images used.</summary>
    public int Images { get; private set; }

    /// <summary>Loads a file; images and buffers beside it are read too, nothing farther away.</summary>
    /// <exception cref="InputException">It is no glTF 2.0 model that can be read.</exception>
    public static GltfModel Load(string path)
    {
        string name = Path.GetFileName(path);
        try
        {
            ModelRoot root = ModelRoot.Load(path, new ReadSettings { Validation = ValidationMode.TryFix });
            var model = new GltfModel();
            Scene? scene = root.DefaultScene ?? root.LogicalScenes.FirstOrDefault();
            if (scene is not null)
            {
                foreach (Node node in Node.Flatten(scene)) if (node.Mesh is { } mesh) model.Add(mesh, node.WorldMatrix);
            }

            var painter = new GltfPainter(name, [.. model.pieces]);
            bool coloured = model.pieces.Any(p => p.HasColour);
            model.Images = model.pieces.Select(p => p.Image).Where(i => !i.IsEmpty).Distinct().Count();
            model.Mesh = new TriangleMesh([.. model.x], [.. model.y], [.. model.z], [], [], [], model.corners) { Paint = coloured ? painter.At : null };
            return model;
        }
        catch (Exception e) when (e is not (InputException or OutOfMemoryException or OperationCanceledException))
        {
            // The library tells what it found in many kinds of exception.
            string found = e.Message.ReplaceLineEndings(" ");
            throw new InputException(name, "the model cannot be read as glTF 2.0", found.Length > 200 ? found[..200] + "..." : found,
                "Export it as GLB without Draco or meshopt compression, or as PLY", e);
        }
    }

    private void Add(Mesh mesh, Matrix4x4 to)
    {
        foreach (MeshPrimitive p in mesh.Primitives)
        {
            if (p.GetVertexAccessor("POSITION") is not { } positions) continue;
            Vector3[] place = [.. positions.AsVector3Array()];
            Vector4[] colour = p.GetVertexAccessor("COLOR_0") is { } c ? [.. c.AsColorArray(1)] : [];
            if (p.DrawPrimitiveType == PrimitiveType.POINTS)
            {
                PointsHaveColour |= colour.Length > 0;
                for (int i = 0; i < place.Length; i++)
                {
                    (double px, double py, double pz) = Turned(Vector3.Transform(place[i], to));
                    Points.Add((px, py, pz, colour.Length > 0 ? colour[i] : Vector4.One));
                }

                continue;
            }

            int[] own = [.. p.GetTriangleIndices().SelectMany(t => (int[])[t.A, t.B, t.C])];
            if (own.Length == 0) continue;
            if (Array.Exists(own, k => k < 0 || k >= place.Length)) throw new InvalidDataException(Invariant($"a triangle names a vertex that does not exist; there are {place.Length}"));
            int start = x.Count;
            foreach (Vector3 v in place)
            {
                (double px, double py, double pz) = Turned(Vector3.Transform(v, to));
                x.Add(px);
                y.Add(py);
                z.Add(pz);
            }

            MaterialChannel? channel = p.Material?.FindChannel("BaseColor");
            ReadOnlyMemory<byte> image = channel?.Texture?.PrimaryImage?.Content.Content ?? default;
            Vector2[] texture = !image.IsEmpty && p.GetVertexAccessor(Invariant($"TEXCOORD_{channel!.Value.TextureCoordinate}")) is { } t ? [.. t.AsVector2Array()] : [];
            pieces.Add(new GltfPiece(own.Length / 3, corners.Count / 3, own, colour, texture, image, channel?.Color ?? Vector4.One));
            corners.AddRange(own.Select(k => k + start));
        }
    }

    // The standard's frame has y up and z toward the viewer: its -z becomes north.
    private static (double X, double Y, double Z) Turned(Vector3 v) => (v.X, -v.Z, v.Y);
}
