namespace CloudStruct.Records.Stages;

/// <summary>Something a stage has to say about its result; ends in run.json and the report.</summary>
/// <param name="Stage">The stage's name.</param>
/// <param name="Text">One or two plain sentences with the figure found.</param>
/// <param name="Doubtful">True when a result should be read with care because of it.</param>
public sealed record Remark(string Stage, string Text, bool Doubtful);
