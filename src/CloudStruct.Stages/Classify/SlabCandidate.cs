using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Classify;

/// <summary>A slab that differs from the rock on both its sides, within one window of the scene.</summary>
/// <param name="Middle">Weighted middle of what lies inside [m].</param>
/// <param name="Normal">Unit normal, sign arbitrary.</param>
/// <param name="WidthM">Distance of its two planes [m].</param>
/// <param name="WindowM">Edge of the cubic window it was seen in [m].</param>
/// <param name="Contrast">Squared differences to the two flanks multiplied, over the variance: 1 is one standard deviation on each side.</param>
/// <param name="Evidence">Contrast times the number of independent patches.</param>
/// <param name="ByColour">True when colour showed it, false when texture did.</param>
internal sealed record SlabCandidate(Vec3 Middle, Vec3 Normal, double WidthM, double WindowM, double Contrast, double Evidence, bool ByColour);
