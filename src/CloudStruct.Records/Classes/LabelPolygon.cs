using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Classes;

/// <summary>A hand label over an area in map view, optionally between two heights.</summary>
/// <param name="Rings">Outer ring first, then holes; survey coordinates [m], z unused; closed (first equals last).</param>
/// <param name="ZMinM">Lower height limit [m]; negative infinity when open.</param>
/// <param name="ZMaxM">Upper height limit [m]; positive infinity when open.</param>
/// <param name="Class">The class given by hand.</param>
/// <param name="Use">Train, check or ignore.</param>
public sealed record LabelPolygon(Vec3[][] Rings, double ZMinM, double ZMaxM, RockClass Class, LabelUse Use);
