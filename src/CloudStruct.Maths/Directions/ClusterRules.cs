namespace CloudStruct.Maths.Directions;

/// <summary>Limits for clusters of axes.</summary>
/// <param name="MostClusters">Most components tried.</param>
/// <param name="FewestAxes">Fewest axes that make a cluster.</param>
/// <param name="DeepestValley">Two components are one cluster when the density between them never falls below this part of
/// the lower summit.</param>
/// <param name="WidestDeg">A component with a larger standard deviation in any direction is no cluster [deg].</param>
public sealed record ClusterRules(int MostClusters, int FewestAxes, double DeepestValley, double WidestDeg);
