namespace CloudStruct.Records.Faces;

/// <summary>What the stage faces gives.</summary>
public sealed record FaceSet
{
    /// <summary>Faces in order of their numbers: Faces[i].FaceId == i + 1.</summary>
    public Face[] Faces { get; init; } = [];

    /// <summary>Face number per working point; 0 none.</summary>
    public int[] FaceOfPoint { get; init; } = [];

    /// <summary>Smallest face reported [m²].</summary>
    public double SmallestFaceM2 { get; init; }

    /// <summary>Farthest a point may lie from its face [m].</summary>
    public double ToleranceM { get; init; }

    /// <summary>Scatter about large faces [m].</summary>
    public double NoiseM { get; init; }

    /// <summary>Length over which the scatter is correlated [m].</summary>
    public double NoiseLengthM { get; init; }
}
