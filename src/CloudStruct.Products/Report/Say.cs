using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Width;
using static System.FormattableString;

namespace CloudStruct.Products.Report;

/// <summary>Numbers as the report's sentences say them, always with their limits.</summary>
internal static class Say
{
    /// <summary>Below this dip no strike is said.</summary>
    private const double FlatDeg = 5;

    /// <summary>"2.50 m (95 %: 2.44 to 2.56 m)".</summary>
    public static string Metres(Estimate? e) =>
        e == null || !double.IsFinite(e.Value) ? "not determined" : Invariant($"{e.Value:F2} m") + Limits(e);

    /// <summary>" (95 %: 2.44 to 2.56 m)"; nothing when the limits are not known.</summary>
    public static string Limits(Estimate e) =>
        double.IsFinite(e.Low95) && double.IsFinite(e.High95) ? Invariant($" (95 %: {e.Low95:F2} to {e.High95:F2} m)") : "";

    /// <summary>"strike 045°, dip 84° SE"; of a flat plane the dip alone.</summary>
    public static string Attitude(Attitude a) => a.DipDeg < FlatDeg
        ? Invariant($"dip {a.DipDeg:F0}°, too flat for a strike")
        : Invariant($"strike {Whole(a.StrikeDeg):000}°, dip {a.DipDeg:F0}° {FrameWords.Compass(a.DipDirectionDeg)}");

    /// <summary>"95 % cone 1.2°, with the model's own errors 1.4°".</summary>
    public static string Cone(PoleRegion? region) =>
        region == null || !double.IsFinite(region.Cone95Deg) ? "95 % cone not determined"
        : double.IsFinite(region.Cone95TotalDeg) ? Invariant($"95 % cone {region.Cone95Deg:F1}°, with the model's own errors {region.Cone95TotalDeg:F1}°")
        : Invariant($"95 % cone {region.Cone95Deg:F1}°");

    /// <summary>"1,234,567".</summary>
    public static string Count(long n) => Invariant($"{n:N0}");

    /// <summary>"1 face", "2 faces".</summary>
    public static string Count(long n, string one, string many) => Count(n) + " " + (n == 1 ? one : many);

    private static double Whole(double deg) => Azimuth.Wrap360(Math.Round(deg));
}
