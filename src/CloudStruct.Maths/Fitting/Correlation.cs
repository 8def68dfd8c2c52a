namespace CloudStruct.Maths.Fitting;

/// <summary>Correlation of a stationary, isotropic field between two places.</summary>
public static class Correlation
{
    /// <summary>Correlation at a distance, 1 at 0.</summary>
    /// <param name="shape">Law.</param>
    /// <param name="distance">Not negative [m].</param>
    /// <param name="length">Length L of the law, above 0 [m].</param>
    public static double At(CorrelationShape shape, double distance, double length)
    {
        double q = distance / length;
        return shape switch
        {
            CorrelationShape.Exponential => Math.Exp(-q),
            CorrelationShape.Matern32 => (1 + (Math.Sqrt(3) * q)) * Math.Exp(-Math.Sqrt(3) * q),
            _ => Math.Exp(-q * q),
        };
    }
}
