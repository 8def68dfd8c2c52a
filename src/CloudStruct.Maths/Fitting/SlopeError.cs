namespace CloudStruct.Maths.Fitting;

/// <summary>Error of a patch's attitude, averaged over the laws of error that its own residuals and the scene leave possible.</summary>
/// <param name="VarianceU">Variance of the slope along the patch's first axis [rad²].</param>
/// <param name="VarianceV">Along the second axis [rad²].</param>
/// <param name="Covariance">Of the two [rad²].</param>
/// <param name="Stretch">Factor on the standard deviations that makes the 95 % radius of a normal law hold 95 % although the
/// variances themselves are estimated.</param>
/// <param name="ErrorVariance">Variance of the points' errors, the part absorbed by the plane included [m²].</param>
/// <param name="LengthM">Mean correlation length, logarithmic [m].</param>
public readonly record struct SlopeError(
    double VarianceU, double VarianceV, double Covariance, double Stretch, double ErrorVariance, double LengthM);
