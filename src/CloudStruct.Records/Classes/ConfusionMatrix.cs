namespace CloudStruct.Records.Classes;

/// <summary>Check labels against result.</summary>
/// <param name="Classes">Order of rows and columns.</param>
/// <param name="Counts">Row-major: Counts[truth * n + found].</param>
/// <param name="Kappa">Cohen's kappa.</param>
public sealed record ConfusionMatrix(RockClass[] Classes, long[] Counts, double Kappa);
