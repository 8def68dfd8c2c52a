namespace CloudStruct.Records.Sets;

/// <summary>One row of common_means.csv: may two mean attitudes be one?</summary>
/// <param name="First">What is compared: "host-1", "dike 1 margin A".</param>
/// <param name="Second">With what.</param>
/// <param name="Zone">The zone in which both were measured; empty for the whole survey, or when each has its own zone.</param>
/// <param name="AngleDeg">Angle between the means [deg], 0 to 90.</param>
/// <param name="Statistic">Watson's V = 2 (Σ w - |Σ w m|), w the reciprocal variance of a mean in one direction.</param>
/// <param name="P">Probability of a larger V when the means are one.</param>
/// <param name="NFirst">Independent planes or windows that the first mean rests on.</param>
/// <param name="NSecond">The same of the second.</param>
/// <param name="Verdict">What that says.</param>
public sealed record CommonMean(
    string First, string Second, string Zone, double AngleDeg, double Statistic, double P, double NFirst, double NSecond, MeansVerdict Verdict);
