namespace CloudStruct.Simulate.Chance;

/// <summary>A range from which each seed draws its own value.</summary>
/// <param name="Low">Lower end.</param>
/// <param name="High">Upper end.</param>
public readonly record struct Span2(double Low, double High)
{
    /// <summary>Middle of the range.</summary>
    public double Middle => (Low + High) / 2;
}
