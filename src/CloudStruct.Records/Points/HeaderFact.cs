namespace CloudStruct.Records.Points;

/// <summary>One fact of a file header.</summary>
/// <param name="Name">Snake-case name: "scale_x".</param>
/// <param name="Value">Invariant text.</param>
public sealed record HeaderFact(string Name, string Value);
