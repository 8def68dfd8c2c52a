namespace CloudStruct.Records.Width;

/// <summary>Laws that widths along a dike, or of many dikes, are compared with.</summary>
public enum ThicknessLawKind
{
    /// <summary>The logarithm is normal: mean and standard deviation of ln(width / 1 m).</summary>
    Lognormal,

    /// <summary>Shape, and scale in metres.</summary>
    Weibull,

    /// <summary>Mean in metres.</summary>
    Exponential,
}
