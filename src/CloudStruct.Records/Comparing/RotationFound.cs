namespace CloudStruct.Records.Comparing;

/// <summary>How the second set of attitudes is turned as a whole against the first.</summary>
/// <param name="AzimuthDeg">Turn about the vertical, clockwise seen from above [deg].</param>
/// <param name="AzimuthLow95Deg">Lower 95 % limit.</param>
/// <param name="AzimuthHigh95Deg">Upper limit.</param>
/// <param name="TiltDeg">Tilt about a level axis [deg].</param>
/// <param name="TiltLow95Deg">Lower 95 % limit, 0 when no tilt is within the errors.</param>
/// <param name="TiltHigh95Deg">Upper limit.</param>
/// <param name="TiltTowardDeg">Grid azimuth toward which the second leans.</param>
/// <param name="Pairs">Pairs it rests on.</param>
public sealed record RotationFound(
    double AzimuthDeg, double AzimuthLow95Deg, double AzimuthHigh95Deg, double TiltDeg, double TiltLow95Deg, double TiltHigh95Deg, double TiltTowardDeg, int Pairs);
