namespace CloudStruct.Maths.Series;

/// <summary>A sudden change in a series.</summary>
/// <param name="At">Where it is likeliest: midway between two observations.</param>
/// <param name="AtLow95">95 % limits of the place by the profile of the likelihood.</param>
/// <param name="AtHigh95">Upper limit.</param>
/// <param name="Size">Value after minus value before.</param>
/// <param name="SizeSigma">One standard deviation of it.</param>
/// <param name="PValue">Probability of as large a change somewhere in a series without one.</param>
public readonly record struct StepFound(double At, double AtLow95, double AtHigh95, double Size, double SizeSigma, double PValue);
