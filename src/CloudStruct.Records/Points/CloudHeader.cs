using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Points;

/// <summary>What a cloud file says of itself before any point is read.</summary>
public sealed record CloudHeader
{
    /// <summary>File name without folders.</summary>
    public string Name { get; init; } = "";

    /// <summary>"LAS 1.2, point format 3", "PLY binary little endian", ...</summary>
    public string Format { get; init; } = "";

    /// <summary>Size of the file [bytes].</summary>
    public long Bytes { get; init; }

    /// <summary>Points the reader will give (for a mesh: samples are decided later, so 0).</summary>
    public long Points { get; init; }

    /// <summary>Triangles of a mesh; 0 for a cloud.</summary>
    public long Triangles { get; init; }

    /// <summary>Whether colour is stored.</summary>
    public bool HasColour { get; init; }

    /// <summary>Whether coordinates are stored as 32-bit floats (their step may be coarse far from the origin).</summary>
    public bool FloatCoordinates { get; init; }

    /// <summary>Lowest corner as declared; null when not declared.</summary>
    public Vec3? Min { get; init; }

    /// <summary>Highest corner as declared; null when not declared.</summary>
    public Vec3? Max { get; init; }

    /// <summary>Coordinate system as declared.</summary>
    public CrsInfo Crs { get; init; } = CrsInfo.None;

    /// <summary>Date of the data as declared, yyyy-MM-dd; empty when none.</summary>
    public string Date { get; init; } = "";

    /// <summary>Further facts in order, for inspect: name and value.</summary>
    public HeaderFact[] Facts { get; init; } = [];

    /// <summary>What is wrong with the file though it can be read, one sentence each.</summary>
    public string[] Problems { get; init; } = [];
}
