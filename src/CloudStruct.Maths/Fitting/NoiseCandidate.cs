namespace CloudStruct.Maths.Fitting;

/// <summary>One possible law of the errors along the normal, up to their variance.</summary>
/// <param name="Shape">Shape of the correlated part.</param>
/// <param name="LengthM">Length of the correlated part [m].</param>
/// <param name="WhiteShare">Share of the variance that is independent from point to point, 0 to 1.</param>
/// <param name="WaveShare">Share of the correlated part that has the long length instead, 0 to 1: an undulation of the surface itself.</param>
/// <param name="WaveLengthM">That long length (Gaussian shape) [m]; unused when the share is 0.</param>
public readonly record struct NoiseCandidate(
    CorrelationShape Shape, double LengthM, double WhiteShare, double WaveShare = 0, double WaveLengthM = 1)
{
    /// <summary>Correlation between two different points at a distance [m].</summary>
    public double At(double distanceM)
    {
        double near = Correlation.At(Shape, distanceM, LengthM);
        double far = WaveShare > 0 ? Correlation.At(CorrelationShape.Gaussian, distanceM, WaveLengthM) : 0;
        return (1 - WhiteShare) * (((1 - WaveShare) * near) + (WaveShare * far));
    }
}
