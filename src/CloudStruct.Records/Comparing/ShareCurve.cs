namespace CloudStruct.Records.Comparing;

/// <summary>Share of differences below a value.</summary>
/// <param name="Label">For the key.</param>
/// <param name="Expected">True for what the stated regions predict, false for what was found.</param>
/// <param name="X">Values, ascending.</param>
/// <param name="Share">Share at or below each, 0 to 1.</param>
public sealed record ShareCurve(string Label, bool Expected, double[] X, double[] Share);
