using CloudStruct.Records.Contacts;

namespace CloudStruct.Records.Drawings;

/// <summary>The lean of one margin over a stretch.</summary>
/// <param name="Margin">Side.</param>
/// <param name="FromM">Start [m of chainage].</param>
/// <param name="ToM">End [m of chainage].</param>
/// <param name="LeanDeg">Tilt from vertical, positive when the top leans toward B [deg]; null where only a line is known.</param>
/// <param name="Low95Deg">Lower limit [deg].</param>
/// <param name="High95Deg">Upper limit [deg].</param>
public sealed record MarginLean(Margin Margin, double FromM, double ToM, double? LeanDeg, double? Low95Deg, double? High95Deg);
