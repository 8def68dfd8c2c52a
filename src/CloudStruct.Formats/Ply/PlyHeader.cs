namespace CloudStruct.Formats.Ply;

/// <summary>The header of a PLY file.</summary>
internal sealed record PlyHeader
{
    /// <summary>File name without folders.</summary>
    public required string Name { get; init; }

    /// <summary>Size of the file [bytes].</summary>
    public required long FileBytes { get; init; }

    /// <summary>How values are stored.</summary>
    public required PlyEncoding Encoding { get; init; }

    /// <summary>Elements in file order.</summary>
    public required PlyElement[] Elements { get; init; }

    /// <summary>Comment and obj_info lines.</summary>
    public required string[] Comments { get; init; }

    /// <summary>First byte after the header.</summary>
    public required long DataAt { get; init; }

    /// <summary>Lines of the header, for line numbers in an ascii file.</summary>
    public required int Lines { get; init; }

    /// <summary>The vertex element; null when there is none.</summary>
    public PlyElement? Vertices => Elements.FirstOrDefault(e => e.Name.Equals("vertex", StringComparison.OrdinalIgnoreCase));

    /// <summary>The face element; null when there is none or it has no list of vertex indices.</summary>
    public PlyElement? Faces => Elements.FirstOrDefault(e =>
        e.Name.Equals("face", StringComparison.OrdinalIgnoreCase) && FaceList(e) >= 0);

    /// <summary>Index of the list of vertex indices in a face element; -1 when there is none.</summary>
    public static int FaceList(PlyElement face) => Array.FindIndex(face.Properties, p =>
        p.IsList && !PlyTypes.IsFloat(p.Type) && p.Name is "vertex_indices" or "vertex_index");
}
