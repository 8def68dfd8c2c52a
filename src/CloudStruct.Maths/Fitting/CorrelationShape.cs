namespace CloudStruct.Maths.Fitting;

/// <summary>How correlation falls with distance.</summary>
public enum CorrelationShape
{
    /// <summary>exp(-d/L): rough at short range.</summary>
    Exponential,

    /// <summary>(1 + √3 d/L) exp(-√3 d/L): Matérn with smoothness 3/2.</summary>
    Matern32,

    /// <summary>exp(-(d/L)²): smooth.</summary>
    Gaussian,
}
