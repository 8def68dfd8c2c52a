using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Sets;

/// <summary>A mean attitude with what a test of a common mean needs.</summary>
/// <param name="Name">"host-1", "dike 1 margin A".</param>
/// <param name="Kind">Means of one kind are compared with those of others only: the domain of a set, or "contact".</param>
/// <param name="Zone">Zone; empty for the whole survey.</param>
/// <param name="Axis">Mean pole.</param>
/// <param name="VarianceRad2">Variance in one direction by internal errors [rad²].</param>
/// <param name="N">Independent observations.</param>
internal sealed record MeanToCompare(string Name, string Kind, string Zone, Vec3 Axis, double VarianceRad2, double N);
