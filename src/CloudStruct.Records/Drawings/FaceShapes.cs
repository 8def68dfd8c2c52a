using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Drawings;

/// <summary>Outlines of all faces as valid, mostly concave polygons on their planes, cut into triangles.</summary>
/// <remarks>In the order of the faces; a face whose outline cannot be mended has no vertex and no triangle. Columns are
/// shared by all faces: the vertices of face i are <see cref="VertexFrom"/>[i] to VertexFrom[i + 1] - 1, local metres,
/// counter-clockwise seen against the upward normal, not closed; its triangles are three numbers each of
/// <see cref="Triangles"/> from <see cref="TriangleFrom"/>[i] on, of vertices counted from the face's first.</remarks>
public sealed record FaceShapes
{
    /// <summary>First vertex of each face, one longer than the list of faces.</summary>
    public int[] VertexFrom { get; init; } = [0];

    /// <summary>East, local [m].</summary>
    public float[] X { get; init; } = [];

    /// <summary>North, local [m].</summary>
    public float[] Y { get; init; } = [];

    /// <summary>Up, local [m].</summary>
    public float[] Z { get; init; } = [];

    /// <summary>First number in <see cref="Triangles"/> of each face, one longer than the list of faces.</summary>
    public int[] TriangleFrom { get; init; } = [0];

    /// <summary>Three vertices a triangle, counter-clockwise like the outline.</summary>
    public int[] Triangles { get; init; } = [];

    /// <summary>The outline of a face, not closed; empty when it has none.</summary>
    /// <param name="face">Place of the face in its list, from 0.</param>
    public Vec3[] Outline(int face)
    {
        int from = VertexFrom[face], count = VertexFrom[face + 1] - from;
        var ring = new Vec3[count];
        for (int i = 0; i < count; i++) ring[i] = new Vec3(X[from + i], Y[from + i], Z[from + i]);
        return ring;
    }
}
