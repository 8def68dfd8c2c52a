using CloudStruct.Simulate.Chance;

namespace CloudStruct.Simulate;

/// <summary>A patch of soil and turf across the dike.</summary>
/// <param name="At">Middle up the slope as a share of the length.</param>
/// <param name="LengthM">Extent up the slope [m].</param>
/// <param name="Across">Middle across the slope as a share of the breadth.</param>
/// <param name="BreadthM">Extent across the slope [m].</param>
public sealed record CoverPlan(Span2 At, Span2 LengthM, Span2 Across, Span2 BreadthM);
