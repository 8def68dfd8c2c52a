using CloudStruct.Records.Frame;

namespace CloudStruct.Formats.Crs;

/// <summary>Cone constant and radius of the parallel of origin of conic grids: how far the meeting point of the meridians lies.</summary>
/// <remarks>Snyder 1987, USGS Prof. Paper 1395: equations 14-3 to 14-14 (Albers), 15-1 to 15-11 (Lambert), ellipsoidal.</remarks>
internal static class ConicApex
{
    /// <summary>Lambert conformal conic.</summary>
    /// <returns>N: cone constant, negative in the south. RhoM: signed distance from the origin's parallel to the apex [m].</returns>
    public static (double N, double RhoM) Conformal(CrsInfo crs, double parallel1Deg, double parallel2Deg, double originDeg)
    {
        double e = Eccentricity(crs), p1 = Radians(parallel1Deg), p2 = Radians(parallel2Deg), p0 = Radians(originDeg);
        double n = Math.Abs(p1 - p2) < 1e-12 ? Math.Sin(p1) : Math.Log(M(p1, e) / M(p2, e)) / Math.Log(T(p1, e) / T(p2, e));
        double f = M(p1, e) / (n * Math.Pow(T(p1, e), n));
        return (n, crs.SemiMajorM * f * Math.Pow(T(p0, e), n));
    }

    /// <summary>Albers equal-area conic.</summary>
    /// <returns>As for <see cref="Conformal"/>.</returns>
    public static (double N, double RhoM) EqualArea(CrsInfo crs, double parallel1Deg, double parallel2Deg, double originDeg)
    {
        double e = Eccentricity(crs), p1 = Radians(parallel1Deg), p2 = Radians(parallel2Deg), p0 = Radians(originDeg);
        double m1 = M(p1, e), m2 = M(p2, e);
        double n = Math.Abs(p1 - p2) < 1e-12 ? Math.Sin(p1) : ((m1 * m1) - (m2 * m2)) / (Q(p2, e) - Q(p1, e));
        double c = (m1 * m1) + (n * Q(p1, e));
        return (n, crs.SemiMajorM * Math.Sqrt(c - (n * Q(p0, e))) / n);
    }

    private static double Eccentricity(CrsInfo crs)
    {
        double f = crs.InverseFlattening > 0 ? 1 / crs.InverseFlattening : 0;
        return Math.Sqrt((2 * f) - (f * f));
    }

    private static double M(double p, double e) => Math.Cos(p) / Math.Sqrt(1 - (e * e * Math.Sin(p) * Math.Sin(p)));

    private static double T(double p, double e)
    {
        double s = e * Math.Sin(p);
        return Math.Tan((Math.PI / 4) - (p / 2)) / Math.Pow((1 - s) / (1 + s), e / 2);
    }

    private static double Q(double p, double e)
    {
        double sin = Math.Sin(p);
        if (e < 1e-10) return 2 * sin;
        double s = e * sin;
        return (1 - (e * e)) * ((sin / (1 - (s * s))) - (Math.Log((1 - s) / (1 + s)) / (2 * e)));
    }

    private static double Radians(double deg) => deg * Math.PI / 180;
}
