namespace CloudStruct.Records.Drawings;

/// <summary>A line or a closed ring on the map.</summary>
/// <param name="Kind">"contact", "concealed" or "dike".</param>
/// <param name="Dike">Number of the dike.</param>
/// <param name="Margin">"A", "B" or empty.</param>
/// <param name="Points">Local east and north [m].</param>
public sealed record MapLine(string Kind, int Dike, string Margin, Point2[] Points);
