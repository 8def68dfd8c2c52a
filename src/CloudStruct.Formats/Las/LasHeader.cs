using CloudStruct.Formats.Laz;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Formats.Las;

/// <summary>The public header block of a LAS file and what stands between it and the points, checked against the file's size.</summary>
internal sealed record LasHeader
{
    /// <summary>File name without folders.</summary>
    public required string Name { get; init; }

    /// <summary>Size of the file [bytes].</summary>
    public required long FileBytes { get; init; }

    /// <summary>Minor version: 0 to 5.</summary>
    public required int Minor { get; init; }

    /// <summary>Bits of the global encoding; 0 before LAS 1.2.</summary>
    public required int Encoding { get; init; }

    /// <summary>Point data record format, 0 to 10.</summary>
    public required int PointFormat { get; init; }

    /// <summary>Bytes of a point record.</summary>
    public required int RecordBytes { get; init; }

    /// <summary>First byte of the points.</summary>
    public required long PointsAt { get; init; }

    /// <summary>Points as the header declares them.</summary>
    public required long Declared { get; init; }

    /// <summary>Whole points that the file can hold; below <see cref="Declared"/> in a truncated file.</summary>
    public required long Present { get; init; }

    /// <summary>Step of stored coordinates.</summary>
    public required Vec3 Scale { get; init; }

    /// <summary>Added to stored coordinates.</summary>
    public required Vec3 Offset { get; init; }

    /// <summary>Declared lowest corner; null when it is not finite or there are no points.</summary>
    public required Vec3? Min { get; init; }

    /// <summary>Declared highest corner.</summary>
    public required Vec3? Max { get; init; }

    /// <summary>Date, yyyy-MM-dd; empty when none or impossible.</summary>
    public required string Date { get; init; }

    /// <summary>What the file says of its coordinate system.</summary>
    public required LasProjection Projection { get; init; }

    /// <summary>Facts for inspect, in order.</summary>
    public required HeaderFact[] Facts { get; init; }

    /// <summary>What is wrong though the points can be read, a sentence each.</summary>
    public required string[] Problems { get; init; }

    /// <summary>How the points are compressed; null when they are plain records.</summary>
    public LazLayout? Laz { get; init; }

    /// <summary>Whether the file is cut short.</summary>
    public bool IsTruncated => Present < Declared;
}
