namespace CloudStruct.Records.Decisions;

/// <summary>What was decided by hand, and what became of it.</summary>
public sealed record DecisionsRecord
{
    /// <summary>One per row of decisions.csv, in its order; empty without one.</summary>
    public DecisionOutcome[] Outcomes { get; init; } = [];

    /// <summary>Per number of a face the words for its column decided: "domain", "set", "note", several with a space between.</summary>
    public Dictionary<int, string> OfFace { get; init; } = [];
}
