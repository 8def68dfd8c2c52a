using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Comparing;

/// <summary>A face or contact row as a table gives it.</summary>
/// <param name="Id">face_id, or "dike 1 A 3" of a contact row.</param>
/// <param name="Group">Set of a face, dike and margin of a contact; empty for none.</param>
/// <param name="Place">Map coordinates of its middle [m].</param>
/// <param name="Normal">Upward unit normal in the grid frame.</param>
/// <param name="LengthM">Extent along strike [m].</param>
/// <param name="HeightM">Extent along dip [m].</param>
/// <param name="AreaM2">Area [m²]; 0 for contact rows.</param>
/// <param name="MajorDeg">Half-axis of the internal 95 % ellipse of the pole where it is widest [deg].</param>
/// <param name="MinorDeg">The other half-axis [deg].</param>
/// <param name="RakeDeg">Rake of the wide axis in the plane, from the strike direction [deg].</param>
/// <param name="ConeTotalDeg">95 % cone with the model's common errors [deg].</param>
public sealed record MeasuredPlane(
    string Id, string Group, Vec3 Place, Vec3 Normal, double LengthM, double HeightM, double AreaM2, double MajorDeg, double MinorDeg, double RakeDeg, double ConeTotalDeg);
