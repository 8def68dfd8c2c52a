using CloudStruct.Simulate;

namespace CloudStruct.Tests.Simulate;

/// <summary>Outcrops that several tests look at, made once.</summary>
internal static class SimulatedOutcrops
{
    private static readonly Lazy<SimulatedOutcrop> MadeDemo = new(() => Outcrop.Make(OutcropPlan.ByName("demo"), 4711, 60_000));

    /// <summary>A dike outcrop of 60 000 points on a seed that no picture was tuned on.</summary>
    public static SimulatedOutcrop Demo => MadeDemo.Value;
}
