using CloudStruct.Simulate.Chance;

namespace CloudStruct.Simulate;

/// <summary>One step or cliff of the terrain.</summary>
/// <param name="At">Place up the slope as a share of the length.</param>
/// <param name="HeightM">Height [m].</param>
/// <param name="RunM">Distance over which it rises [m]: small for a wall.</param>
public sealed record StepPlan(Span2 At, Span2 HeightM, Span2 RunM);
