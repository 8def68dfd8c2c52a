using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Contacts;

/// <summary>What is known so far of the dike at one place along strike.</summary>
/// <param name="Middle">Between the margins, local [m].</param>
/// <param name="Normal">Unit normal, from A to B.</param>
/// <param name="WidthM">Distance of the margins [m].</param>
/// <param name="Weight">Trust in the normal.</param>
internal readonly record struct SheetPiece(Vec3 Middle, Vec3 Normal, double WidthM, double Weight);
