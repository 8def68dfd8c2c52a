using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Classes;

/// <summary>A hand label at one place.</summary>
/// <param name="Place">Survey coordinates [m].</param>
/// <param name="Class">The class given by hand.</param>
/// <param name="Use">Train, check or ignore.</param>
public sealed record LabelPoint(Vec3 Place, RockClass Class, LabelUse Use);
