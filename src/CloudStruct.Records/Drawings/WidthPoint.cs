using CloudStruct.Records.Width;

namespace CloudStruct.Records.Drawings;

/// <summary>One station on the width profile.</summary>
/// <param name="ChainageM">Chainage [m].</param>
/// <param name="WidthM">True width [m]; null when not measured.</param>
/// <param name="Low95M">Lower limit [m].</param>
/// <param name="High95M">Upper limit [m].</param>
/// <param name="ApparentM">Apparent width where only that is known [m].</param>
/// <param name="VisibleM">Lower bound where a margin is hidden [m].</param>
/// <param name="Status">Status.</param>
public sealed record WidthPoint(
    double ChainageM, double? WidthM, double? Low95M, double? High95M, double? ApparentM, double? VisibleM, StationStatus Status);
