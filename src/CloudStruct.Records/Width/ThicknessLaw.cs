namespace CloudStruct.Records.Width;

/// <summary>A law fitted to widths.</summary>
/// <param name="Kind">Which.</param>
/// <param name="First">Lognormal: mean of ln(width / 1 m). Weibull: shape. Exponential: mean [m].</param>
/// <param name="Second">Lognormal: standard deviation of ln(width). Weibull: scale [m]. Exponential: null.</param>
/// <param name="LogLikelihood">Natural logarithm of the likelihood.</param>
/// <param name="Aic">Akaike's criterion: the smallest of several laws fits best for its number of parameters.</param>
public sealed record ThicknessLaw(ThicknessLawKind Kind, double First, double? Second, double LogLikelihood, double Aic);
