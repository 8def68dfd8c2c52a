namespace CloudStruct.Records.Drawings;

/// <summary>An attitude on the map.</summary>
/// <param name="At">Local east and north [m].</param>
/// <param name="Kind">"inclined", "vertical" (a dip that rounds to 90 deg) or "horizontal" (dip below 5 deg).</param>
/// <param name="RotationGridDeg">Strike by the right-hand rule from grid north: clockwise turn of a symbol drawn with its bar
/// upward and its tick to the right.</param>
/// <param name="DipDeg">Dip, whole degrees.</param>
/// <param name="FaceId">Number of the face; 0 for a contact.</param>
/// <param name="Group">Set of the face, or "contact"; empty when it belongs to none.</param>
/// <param name="Domain">Domain of the face in lower case, or "contact".</param>
public sealed record MapSymbol(Point2 At, string Kind, double RotationGridDeg, int DipDeg, int FaceId, string Group, string Domain);
