namespace CloudStruct.Stages.Classify;

/// <summary>What speaks for and against a sheet being a dike.</summary>
/// <param name="WidthM">Median width [m].</param>
/// <param name="LengthM">Length along strike between the first and last knot where both margins show [m].</param>
/// <param name="WanderM">Median distance of the margins of narrow strips from the sheet [m].</param>
/// <param name="BothMargins">Share of knots at which both margins show.</param>
/// <param name="ColourAuc">Held-out separation of inside and the worse flank by colour.</param>
/// <param name="TextureAuc">The same by the shape of the surface alone.</param>
/// <param name="SlopeAuc">How far the slope of the ground alone tells inside from outside: a wall or a bench edge is no dike.</param>
/// <param name="WidthSpread">Spread of the widths along the sheet over their median: wedges are no dikes.</param>
internal sealed record DikeJudgement(
    double WidthM, double LengthM, double WanderM, double BothMargins, double ColourAuc, double TextureAuc, double SlopeAuc, double WidthSpread);
