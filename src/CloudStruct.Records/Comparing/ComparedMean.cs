namespace CloudStruct.Records.Comparing;

/// <summary>Watson's test of a common mean of a group.</summary>
/// <param name="Group">Set, or dike and margin.</param>
/// <param name="Pairs">Pairs in it.</param>
/// <param name="AngleDeg">Angle between the two means [deg].</param>
/// <param name="CriticalDeg">Angle above which the test refuses a common mean at 5 % [deg].</param>
/// <param name="P">Probability of a larger angle when the means are one.</param>
public sealed record ComparedMean(string Group, int Pairs, double AngleDeg, double CriticalDeg, double P);
