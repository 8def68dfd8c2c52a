using CloudStruct.Simulate;

namespace CloudStruct.Tests.Simulate;

/// <summary>Outcrops that several tests look at, made once.</summary>
public sealed class SimulatedFixture
{
    /// <summary>A dike outcrop of 60 000 points on a seed that no picture was tuned on.</summary>
    public SimulatedOutcrop Demo { get; } = Outcrop.Make(OutcropPlan.ByName("demo"), 4711, 60_000);
}
