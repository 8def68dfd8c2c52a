using CloudStruct.Records.Points;

namespace CloudStruct.Simulate;

/// <summary>One cloud of the demonstration survey.</summary>
/// <param name="Path">File to write, relative to the survey.</param>
/// <param name="Source">Its points, in map coordinates.</param>
/// <param name="PointOf">Index in the outcrop of each point of the tile.</param>
/// <param name="ShiftZM">How much the tile lies too high [m].</param>
public sealed record DemoTile(string Path, IPointSource Source, int[] PointOf, double ShiftZM);
