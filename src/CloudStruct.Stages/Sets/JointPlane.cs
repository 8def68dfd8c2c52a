using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Sets;

/// <summary>Faces that lie on one plane of the rock: one observation of its attitude, however many pieces of it show.</summary>
/// <param name="Faces">Indices of the faces, ascending.</param>
/// <param name="Normal">Unit normal, either sign: mean axis of the pieces, weighted by their precision.</param>
/// <param name="AreaM2">Exposed area of all pieces [m²].</param>
/// <param name="ErrorRad">One standard deviation of the attitude in each direction [rad].</param>
internal sealed record JointPlane(int[] Faces, Vec3 Normal, double AreaM2, double ErrorRad);
