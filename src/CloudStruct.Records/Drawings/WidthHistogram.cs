namespace CloudStruct.Records.Drawings;

/// <summary>Widths of the measured stations in equal bins, with the laws fitted to them.</summary>
/// <param name="FromM">Lower edge of the first bin [m].</param>
/// <param name="BinM">Width of a bin [m].</param>
/// <param name="Counts">Stations a bin; one on an edge belongs to the upper bin.</param>
/// <param name="Laws">Curves of the laws, in the order of their kinds.</param>
public sealed record WidthHistogram(double FromM, double BinM, int[] Counts, LawCurve[] Laws);
