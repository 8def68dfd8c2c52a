namespace CloudStruct.Records.Faces;

/// <summary>What the stage faces gives.</summary>
public sealed record FaceSet
{
    /// <summary>Faces by falling area. Whatever refers to a face by its place in this list counts from 1; <see cref="Face.FaceId"/> is for
    /// readers of the results.</summary>
    public Face[] Faces { get; init; } = [];

    /// <summary>Place in <see cref="Faces"/>, counted from 1, per working point; 0 none.</summary>
    public int[] FaceOfPoint { get; init; } = [];

    /// <summary>Smallest face reported [m²].</summary>
    public double SmallestFaceM2 { get; init; }

    /// <summary>Farthest a point may lie from its face [m].</summary>
    public double ToleranceM { get; init; }

    /// <summary>Standard deviation of the points' errors along the normal, with the part that fitted planes absorb [m].</summary>
    public double NoiseM { get; init; }

    /// <summary>Length over which those errors are correlated [m].</summary>
    public double NoiseLengthM { get; init; }
}
