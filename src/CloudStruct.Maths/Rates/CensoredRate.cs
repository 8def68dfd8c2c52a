using CloudStruct.Records.Width;
using MathNet.Numerics.Distributions;

namespace CloudStruct.Maths.Rates;

/// <summary>Rate of events along lines whose first and last gaps are cut off by the ends.</summary>
/// <param name="Events">Independent events.</param>
/// <param name="Length">Length on which they were looked for, cut-off gaps included.</param>
/// <remarks>With exponential gaps the likelihood is λⁿ exp(-λ L): the rate is n/L whatever the ends cut off, and 2 λ L follows
/// chi-square with 2n degrees of freedom, which gives the limits (Priest and Hudson 1981, IJRMMS 18, 183-197, from memory).</remarks>
public readonly record struct CensoredRate(double Events, double Length)
{
    /// <summary>Events per length.</summary>
    public double Rate => Events / Length;

    /// <summary>95 % limits of the rate.</summary>
    public (double Low95, double High95) Limits =>
        (ChiSquared.InvCDF(2 * Events, 0.025) / (2 * Length), ChiSquared.InvCDF(2 * Events, 0.975) / (2 * Length));

    /// <summary>Mean gap with its 95 % limits.</summary>
    public Estimate MeanGap => new(1 / Rate, 1 / Limits.High95, 1 / Limits.Low95);
}
