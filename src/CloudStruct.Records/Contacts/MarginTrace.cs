using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Contacts;

/// <summary>A margin as a 3D polyline, in order of chainage; broken where the margin is hidden.</summary>
/// <param name="Dike">Number of the dike.</param>
/// <param name="Margin">Side.</param>
/// <param name="Points">Vertices, local [m].</param>
/// <param name="ChainageM">Chainage of each vertex [m].</param>
/// <param name="SigmaM">Position error of each vertex across the margin, one sigma [m].</param>
public sealed record MarginTrace(int Dike, Margin Margin, Vec3[] Points, double[] ChainageM, double[] SigmaM);
