namespace CloudStruct.Maths.Fitting;

/// <summary>What the whole scene says about the errors before a patch is looked at.</summary>
/// <param name="LogShare">Log probability of each candidate law, with some left for laws that the scene does not show.</param>
/// <param name="Share">Share of each law in the scene as learnt.</param>
/// <param name="Variance">Typical variance of the errors [m²].</param>
/// <param name="Freedom">How firmly patches keep to that variance: degrees of freedom of the scaled inverse chi-square law.</param>
public sealed record NoisePrior(double[] LogShare, double[] Share, double Variance, double Freedom);
