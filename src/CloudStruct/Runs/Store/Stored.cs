using CloudStruct.Records.Stages;

namespace CloudStruct.Runs.Store;

/// <summary>A stage's record with the remarks it made, so that a cached stage says again what it said.</summary>
/// <param name="Record">The record.</param>
/// <param name="Remarks">Its remarks.</param>
public sealed record Stored<T>(T Record, Remark[] Remarks);
