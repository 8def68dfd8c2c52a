namespace CloudStruct.Records.Sets;

/// <summary>What the stage sets gives.</summary>
public sealed record SetsRecord
{
    /// <summary>Sets, domain after domain, in order of their numbers.</summary>
    public OrientationSet[] Sets { get; init; } = [];

    /// <summary>Name of the set of every face, in the order of the faces; empty when it belongs to none.</summary>
    public string[] SetOfFace { get; init; } = [];
}
