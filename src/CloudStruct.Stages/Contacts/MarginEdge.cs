using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Contacts;

/// <summary>A place where two neighbouring points are of different rock.</summary>
/// <param name="Place">Where the change lies between them, local [m].</param>
/// <param name="Outward">Unit vector from the dike's point to the host's.</param>
/// <param name="Weight">0.1 to 1: how clear the change of probability is.</param>
internal readonly record struct MarginEdge(Vec3 Place, Vec3 Outward, double Weight);
