namespace CloudStruct.Records.Drawings;

/// <summary>A curve on a net.</summary>
/// <param name="Kind">"great_circle" of a mean plane, "cone" of its 95 % region, or "contour".</param>
/// <param name="Group">Name of the set; empty for contours.</param>
/// <param name="Level">Contour level in standard deviations above uniform; 0 otherwise.</param>
/// <param name="Points">Vertices, primitive radius 1; a curve that leaves the net is cut into several.</param>
public sealed record NetCurve(string Kind, string Group, double Level, Point2[] Points);
