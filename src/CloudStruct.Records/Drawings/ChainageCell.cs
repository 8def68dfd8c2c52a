namespace CloudStruct.Records.Drawings;

/// <summary>What the surface about a dike is made of over a short stretch of chainage.</summary>
/// <param name="Dike">Number of the dike.</param>
/// <param name="FromM">Start of the stretch [m].</param>
/// <param name="ToM">End of the stretch [m].</param>
/// <param name="CoverShare">Part of the surface within reach of the dike that is cover, 0 to 1.</param>
/// <param name="InclusionShare">Part of the dike's own surface that is inclusions, 0 to 1; null where no dike rock shows.</param>
/// <param name="PointsPerM2">Input points on a square metre of surface.</param>
public sealed record ChainageCell(int Dike, double FromM, double ToM, double CoverShare, double? InclusionShare, double PointsPerM2);
