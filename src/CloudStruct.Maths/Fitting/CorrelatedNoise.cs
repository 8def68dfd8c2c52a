namespace CloudStruct.Maths.Fitting;

/// <summary>Noise whose neighbours are alike: a part that falls off exponentially with distance and a white part.</summary>
/// <param name="Sigma">Standard deviation of the whole, in the unit of the observations.</param>
/// <param name="Range">Distance over which the correlation falls to 1/e.</param>
/// <param name="WhiteShare">Share of the variance that is white, 0 to 1.</param>
public readonly record struct CorrelatedNoise(double Sigma, double Range, double WhiteShare)
{
    /// <summary>Covariance of two different observations at a distance.</summary>
    public double Covariance(double distance) => Sigma * Sigma * (1 - WhiteShare) * Math.Exp(-distance / Range);

    /// <summary>Variance of one observation.</summary>
    /// <param name="whiteFactor">The white part times this: above 1 for a mean of fewer single readings than usual.</param>
    public double Variance(double whiteFactor = 1) => Sigma * Sigma * (1 - WhiteShare + (WhiteShare * whiteFactor));
}
