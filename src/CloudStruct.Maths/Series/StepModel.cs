namespace CloudStruct.Maths.Series;

/// <summary>A series as an even trend with sudden changes and correlated scatter.</summary>
/// <param name="Steps">Changes in the order of their places.</param>
/// <param name="Slope">Even change per unit of the abscissa, the steps taken out.</param>
/// <param name="SlopeSigma">One standard deviation of it.</param>
/// <param name="SlopePValue">Probability of as steep a trend in a series without one.</param>
/// <param name="Freedom">Observations less parameters.</param>
public sealed record StepModel(StepFound[] Steps, double Slope, double SlopeSigma, double SlopePValue, int Freedom);
