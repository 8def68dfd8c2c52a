using System.Numerics;
using System.Text.Json.Nodes;
using SharpGLTF.Schema2;

namespace CloudStruct.Formats.Gltf;

/// <summary>Writes a binary glTF 2.0 file: a node per part below a node per group.</summary>
/// <remarks>The axes of glTF are x right, y up, z toward the eye: east, up and south here, so that an untouched viewer looks
/// north. All vertices of a kind share one view of the buffer; positions start at the parts' own first vertex. The same
/// parts give the same bytes.</remarks>
public static class GltfModelWriter
{
    /// <summary>Writes a model; the stream stays open.</summary>
    /// <param name="stream">Where.</param>
    /// <param name="parts">In order; parts without vertices are left out.</param>
    /// <param name="generator">Name and version of the writer.</param>
    /// <param name="facts">Frame, origin and run, for the extras of the asset.</param>
    public static void Write(Stream stream, IReadOnlyList<GltfPart> parts, string generator, JsonObject facts)
    {
        ModelRoot root = ModelRoot.CreateModel();
        root.Asset.Generator = generator;
        root.Asset.Extras = facts;
        Scene scene = root.UseScene("survey");
        root.DefaultScene = scene;
        GltfPart[] shown = [.. parts.Where(p => p.Places.Length > 0)];
        var buffers = new GltfBuffers(root, shown);
        var groups = new Dictionary<string, Node>(StringComparer.Ordinal);
        var materials = new Dictionary<(byte, byte, byte, double, bool), Material>();
        for (int i = 0; i < shown.Length; i++)
        {
            GltfPart part = shown[i];
            if (!groups.TryGetValue(part.Group, out Node? group)) groups[part.Group] = group = scene.CreateNode(part.Group);
            Node node = group.CreateNode(part.Name);
            node.Extras = part.Facts.DeepClone();
            Mesh mesh = root.CreateMesh(part.Name);
            node.Mesh = mesh;
            MeshPrimitive primitive = mesh.CreatePrimitive();
            primitive.SetVertexAccessor("POSITION", buffers.Places(i));
            if (part.Rgb.Length > 0) primitive.SetVertexAccessor("COLOR_0", buffers.Colours(i));
            if (part.Triangles.Length > 0)
            {
                primitive.DrawPrimitiveType = PrimitiveType.TRIANGLES;
                primitive.SetIndexAccessor(buffers.Triangles(i));
            }
            else
            {
                primitive.DrawPrimitiveType = PrimitiveType.POINTS;
            }

            (byte, byte, byte, double, bool) look = (part.Colour.Red, part.Colour.Green, part.Colour.Blue, part.Clear, part.Triangles.Length == 0);
            if (!materials.TryGetValue(look, out Material? material)) materials[look] = material = Make(root, part, materials.Count);
            primitive.Material = material;
        }

        root.WriteGLB(stream, new WriteSettings { JsonIndented = false, Validation = SharpGLTF.Validation.ValidationMode.Skip });
    }

    // Rock is rough and no metal. Points have no side to the light: their colours are shown as they are.
    private static Material Make(ModelRoot root, GltfPart part, int number)
    {
        Material material = root.CreateMaterial(FormattableString.Invariant($"look-{number + 1}"));
        if (part.Triangles.Length == 0) material.InitializeUnlit();
        else material.InitializePBRMetallicRoughness();
        MaterialChannel? colour = material.FindChannel("BaseColor");
        if (colour is { } c) c.Color = new Vector4(Linear(part.Colour.Red), Linear(part.Colour.Green), Linear(part.Colour.Blue), (float)(1 - part.Clear));
        if (part.Triangles.Length > 0 && material.FindChannel("MetallicRoughness") is { } rough)
        {
            rough.SetFactor("MetallicFactor", 0);
            rough.SetFactor("RoughnessFactor", 1);
        }

        material.DoubleSided = true;
        if (part.Clear > 0) material.Alpha = AlphaMode.BLEND;
        return material;
    }

    /// <summary>Linear light of an 8-bit sRGB value (IEC 61966-2-1): what glTF asks of factors and vertex colours.</summary>
    internal static float Linear(byte value) => LinearLight[value];

    private static readonly float[] LinearLight = [.. Enumerable.Range(0, 256).Select(v => v / 255.0)
        .Select(c => (float)(c <= 0.04045 ? c / 12.92 : Math.Pow((c + 0.055) / 1.055, 2.4)))];
}
