namespace CloudStruct.Maths.Fitting;

/// <summary>One possible law of the errors along the normal, up to their variance.</summary>
/// <param name="Shape">Shape of the correlated part.</param>
/// <param name="LengthM">Length of the correlated part [m].</param>
/// <param name="WhiteShare">Share of the variance that is independent from point to point, 0 to 1.</param>
public readonly record struct NoiseCandidate(CorrelationShape Shape, double LengthM, double WhiteShare);
