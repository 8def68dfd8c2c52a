namespace CloudStruct.Records.Width;

/// <summary>A number with its 95 % limits.</summary>
/// <param name="Value">Best value.</param>
/// <param name="Low95">Lower limit.</param>
/// <param name="High95">Upper limit.</param>
public sealed record Estimate(double Value, double Low95, double High95);
