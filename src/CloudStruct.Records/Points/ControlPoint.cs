using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Points;

/// <summary>A surveyed place, with the place of the same mark in the model when it was picked there.</summary>
/// <param name="Id">Name.</param>
/// <param name="Place">Surveyed place, survey coordinates [m].</param>
/// <param name="Model">Place in the model [m]; null when only the distance along the surface normal can be given.</param>
/// <param name="SigmaHM">Horizontal sigma of the surveyed place [m].</param>
/// <param name="SigmaVM">Vertical sigma of the surveyed place [m].</param>
/// <param name="IsCheck">True for a check point, false for control used in building the model.</param>
public sealed record ControlPoint(string Id, Vec3 Place, Vec3? Model, double SigmaHM, double SigmaVM, bool IsCheck);
