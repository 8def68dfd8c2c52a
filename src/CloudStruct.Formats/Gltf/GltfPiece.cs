using System.Numerics;

namespace CloudStruct.Formats.Gltf;

/// <summary>One primitive of a model where a node puts it.</summary>
/// <param name="Triangles">Triangles.</param>
/// <param name="First">Number of its first triangle in the whole.</param>
/// <param name="Corners">Three vertex numbers a triangle, its own.</param>
/// <param name="Colour">Linear colour of each vertex; empty without.</param>
/// <param name="Texture">Place of each vertex in the texture; empty without.</param>
/// <param name="Image">Encoded image; empty without.</param>
/// <param name="Factor">Linear colour of the material.</param>
internal sealed record GltfPiece(int Triangles, int First, int[] Corners, Vector4[] Colour, Vector2[] Texture, ReadOnlyMemory<byte> Image, Vector4 Factor)
{
    /// <summary>Whether it says anything about colour.</summary>
    public bool HasColour => Colour.Length > 0 || !Image.IsEmpty || Factor != Vector4.One;
}
