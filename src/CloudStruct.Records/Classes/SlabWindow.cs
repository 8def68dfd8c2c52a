using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Classes;

/// <summary>A short piece of a dike as a slab between two planes with one normal.</summary>
/// <param name="Middle">Middle of the piece on the slab's middle plane, local frame [m].</param>
/// <param name="Normal">Unit normal pointing from margin A to margin B.</param>
/// <param name="LengthM">Length along strike [m].</param>
/// <param name="WidthM">Distance between the two planes [m].</param>
public sealed record SlabWindow(Vec3 Middle, Vec3 Normal, double LengthM, double WidthM);
