namespace CloudStruct.Records.Decisions;

/// <summary>What became of a decision in this run.</summary>
/// <param name="Decision">The row.</param>
/// <param name="Applied">False when nothing in this run matches it.</param>
/// <param name="FaceId">Number of the face it was applied to; 0 when it is not about a face or matches none.</param>
/// <param name="Found">What was done, or why not, in one clause.</param>
public sealed record DecisionOutcome(Decision Decision, bool Applied, int FaceId, string Found);
