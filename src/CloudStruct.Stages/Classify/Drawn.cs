namespace CloudStruct.Stages.Classify;

/// <summary>The outline of one dike at the spacing of the points, and what its margins look like from near.</summary>
/// <param name="Dike">The dike.</param>
/// <param name="Inside">Whether each patch is its.</param>
/// <param name="Say">Whether each working point is its.</param>
/// <param name="Odds">Log odds per patch; 0 far away.</param>
/// <param name="ScatterM">Median scatter of the outline's edge about margins fitted within a step or two [m].</param>
/// <param name="Sharpness">Share of the change of colour from well outside to well inside that happens within 9 cm
/// of the margin: near 1 for a contact of two rocks, far less for stains and shade. NaN without colour.</param>
/// <param name="Widening">How many times wider than 9 cm the strip beside the margins had to be, because points are coarse.</param>
internal sealed record Drawn(FoundDike Dike, bool[] Inside, bool[] Say, float[] Odds, double ScatterM, double Sharpness, double Widening);
