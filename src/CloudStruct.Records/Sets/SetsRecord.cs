using CloudStruct.Records.Decisions;

namespace CloudStruct.Records.Sets;

/// <summary>What the stage sets gives.</summary>
public sealed record SetsRecord
{
    /// <summary>Sets, domain after domain, in order of their numbers; after them the same sets in every zone.</summary>
    public OrientationSet[] Sets { get; init; } = [];

    /// <summary>Name of the set of every face, in the order of the faces; empty when it belongs to none.</summary>
    public string[] SetOfFace { get; init; } = [];

    /// <summary>Which means may be one.</summary>
    public CommonMean[] CommonMeans { get; init; } = [];

    /// <summary>What became of decisions about sets, in their order.</summary>
    public DecisionOutcome[] Decided { get; init; } = [];
}
