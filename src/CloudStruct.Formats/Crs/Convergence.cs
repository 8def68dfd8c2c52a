using CloudStruct.Records.Frame;

namespace CloudStruct.Formats.Crs;

/// <summary>Meridian convergence: the angle from true north to grid north, so that true azimuth = grid azimuth + convergence.</summary>
/// <remarks>Positive east of the central meridian in the northern hemisphere. Conic and polar grids have straight meridians
/// that meet in one point, so the direction to that point is the answer; the point of a conic follows from its parameters
/// (Snyder 1987, Map projections: a working manual, USGS Prof. Paper 1395, chapters 14, 15, 20, 21). A Mercator grid has
/// none. For transverse Mercator the meridian's direction is taken numerically from the projection library.</remarks>
public static class Convergence
{
    // Half a second of arc to each side, about 15 m: the error of the central difference is far below 1e-9 deg, and
    // rounding of coordinates (nanometres) far below 1e-7 deg.
    private const double StepDeg = 1.0 / 7200;

    /// <summary>Convergence at a place [deg].</summary>
    /// <param name="crs">A projected system with method and parameters.</param>
    /// <param name="x">East, in the system's own unit.</param>
    /// <param name="y">North, in the system's own unit.</param>
    /// <returns>Null when the system is not one of those that are guaranteed, lacks parameters, or the place is outside it.</returns>
    public static double? At(CrsInfo crs, double x, double y) => Of(crs)(x, y);

    /// <summary>The same as a function for many places: what can be prepared once is.</summary>
    public static Func<double, double, double?> Of(CrsInfo crs)
    {
        if (crs.Kind != CrsKind.Projected || crs.Parameters.Length == 0 || !(crs.HorizontalUnitM > 0)) return (_, _) => null;
        double unit = crs.HorizontalUnitM;
        Func<double, double, double?> metres = crs.Method switch
        {
            Methods.TransverseMercator => Transverse(crs),
            Methods.LambertConic or Methods.Albers => Conic(crs),
            Methods.PolarStereographic => Polar(crs),
            Methods.Mercator => (_, _) => 0,
            _ => (_, _) => null,
        };
        return (x, y) => double.IsFinite(x) && double.IsFinite(y) && metres(x * unit, y * unit) is double c && double.IsFinite(c) ? c : null;
    }

    private static Func<double, double, double?> Transverse(CrsInfo crs)
    {
        if (TransverseGrid.Of(crs) is not { } grid) return (_, _) => null;
        return (x, y) =>
        {
            (double lon, double lat) = grid.Back(x, y);
            if (!(Math.Abs(lat) < 89.9 && Math.Abs(lon) < 80)) return null;
            (double x0, double y0) = grid.Forward(lon, lat - StepDeg);
            (double x1, double y1) = grid.Forward(lon, lat + StepDeg);
            return -Math.Atan2(x1 - x0, y1 - y0) * 180 / Math.PI;
        };
    }

    private static Func<double, double, double?> Conic(CrsInfo crs)
    {
        double? p1 = Value(crs, "standard_parallel_1_deg"), p2 = Value(crs, "standard_parallel_2_deg");
        double? origin = Value(crs, "latitude_of_origin_deg");
        p1 ??= origin;
        p2 ??= p1;
        if (p1 == null || crs.SemiMajorM <= 0) return (_, _) => null;
        double scale = Value(crs, "scale_factor") is double s and > 0 ? s : 1;   // files with a factor of 0 exist
        (double n, double rho) = crs.Method == Methods.Albers
            ? ConicApex.EqualArea(crs, p1.Value, p2!.Value, origin ?? 0)
            : ConicApex.Conformal(crs, p1.Value, p2!.Value, origin ?? 0);
        double apexX = Value(crs, "false_easting_m") ?? 0, apexY = (Value(crs, "false_northing_m") ?? 0) + (rho * scale);
        // South of the equator the cone opens upward: the apex lies to the south and north points away from it.
        int away = n < 0 ? -1 : 1;
        return (x, y) => x == apexX && y == apexY ? null : -Math.Atan2(away * (apexX - x), away * (apexY - y)) * 180 / Math.PI;
    }

    private static Func<double, double, double?> Polar(CrsInfo crs)
    {
        double? at = Value(crs, "standard_parallel_1_deg") ?? Value(crs, "latitude_of_origin_deg");
        if (at is not double latitude || latitude == 0) return (_, _) => null;
        double poleX = Value(crs, "false_easting_m") ?? 0, poleY = Value(crs, "false_northing_m") ?? 0;
        int away = latitude < 0 ? -1 : 1;
        return (x, y) => x == poleX && y == poleY ? null : -Math.Atan2(away * (poleX - x), away * (poleY - y)) * 180 / Math.PI;
    }

    private static double? Value(CrsInfo crs, string name) => crs.Parameters.FirstOrDefault(p => p.Name == name)?.Value;
}
