namespace CloudStruct.Simulate;

/// <summary>One text file of the demonstration survey.</summary>
/// <param name="Path">File to write, relative to the survey.</param>
/// <param name="Text">Its text, with line feeds.</param>
public sealed record DemoFile(string Path, string Text);
