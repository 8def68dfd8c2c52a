using CloudStruct.Records.Width;

namespace CloudStruct.Records.Drawings;

/// <summary>A fitted law over a histogram.</summary>
/// <param name="Kind">Which.</param>
/// <param name="Best">Whether it has the smallest Akaike criterion of those fitted.</param>
/// <param name="Points">Width [m] and stations expected in a bin about it.</param>
public sealed record LawCurve(ThicknessLawKind Kind, bool Best, Point2[] Points);
