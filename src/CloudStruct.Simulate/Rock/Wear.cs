namespace CloudStruct.Simulate.Rock;

/// <summary>What has become of a place of the surface.</summary>
/// <param name="InwardM">How far it lies inward of its plane [m].</param>
/// <param name="OnPlane">Whether it still belongs to the plane.</param>
/// <param name="Weathered">Whether the block's top is weathered.</param>
/// <param name="CrackM">Distance to the nearest open joint that crosses the surface [m]; infinite without one.</param>
internal readonly record struct Wear(double InwardM, bool OnPlane, bool Weathered, double CrackM);
