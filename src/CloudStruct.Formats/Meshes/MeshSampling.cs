namespace CloudStruct.Formats.Meshes;

/// <summary>How densely a mesh is sampled to become a cloud.</summary>
public sealed record MeshSampling
{
    /// <summary>Least samples of a mesh, however coarse its triangles.</summary>
    public long Least { get; init; } = 200_000;

    /// <summary>Most samples of a mesh, however fine its triangles.</summary>
    public long Most { get; init; } = 5_000_000;

    /// <summary>Side of the square of surface that one sample stands for, in file units; null: the median edge of the
    /// triangles, which is about the detail that the mesh holds.</summary>
    public double? Spacing { get; init; }
}
