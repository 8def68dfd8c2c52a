namespace CloudStruct.Records.Drawings;

/// <summary>A pole on a net.</summary>
/// <param name="At">Equal-area lower-hemisphere place, primitive radius 1, north up.</param>
/// <param name="AreaM2">Area of the face [m²]; 0 when not a face.</param>
/// <param name="Group">Name of its set; empty when it belongs to none.</param>
/// <param name="FaceId">Number of the face; 0 when not a face.</param>
public sealed record NetPole(Point2 At, double AreaM2, string Group, int FaceId);
