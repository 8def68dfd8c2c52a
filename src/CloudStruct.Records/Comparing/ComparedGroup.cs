namespace CloudStruct.Records.Comparing;

/// <summary>How often the stated regions held, over pairs of one kind.</summary>
/// <param name="Name">Which pairs: "faces above 1 m2".</param>
/// <param name="Kind">face, contact or width.</param>
/// <param name="Pairs">How many.</param>
/// <param name="Share95">Share whose difference lies in its stated 95 % region.</param>
/// <param name="ShareLow95">Lower 95 % limit of the share (Wilson 1927), pairs taken as independent.</param>
/// <param name="ShareHigh95">Upper limit.</param>
/// <param name="Spread">Median of the normalised difference over the median that true regions would give: 1 when regions are true, above when they are too narrow.</param>
/// <param name="MedianDifference">Median difference: angle left [deg], width [m].</param>
public sealed record ComparedGroup(string Name, string Kind, int Pairs, double Share95, double ShareLow95, double ShareHigh95, double Spread, double MedianDifference);
