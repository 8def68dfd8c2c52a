using CloudStruct.Records.Frame;
using ProjNet.CoordinateSystems;
using ProjNet.CoordinateSystems.Transformations;

namespace CloudStruct.Formats.Crs;

/// <summary>A transverse Mercator grid and its way back to longitude and latitude, through the projection library.</summary>
internal sealed class TransverseGrid
{
    private readonly MathTransform forward, back;

    private TransverseGrid(MathTransform forward, double meridianDeg)
    {
        this.forward = forward;
        back = forward.Inverse();
        MeridianDeg = meridianDeg;
    }

    /// <summary>Longitude of the central meridian [deg].</summary>
    public double MeridianDeg { get; }

    /// <summary>The grid of a system; null when it lacks parameters.</summary>
    public static TransverseGrid? Of(CrsInfo crs)
    {
        if (crs.Method != Methods.TransverseMercator || Value(crs, "central_meridian_deg") is not double meridian || crs.SemiMajorM <= 0) return null;
        // In metres and without datum, so that any text's units and names cannot disturb the library.
        var factory = new CoordinateSystemFactory();
        Ellipsoid ellipsoid = factory.CreateFlattenedSphere("e", crs.SemiMajorM, crs.InverseFlattening, LinearUnit.Metre);
        HorizontalDatum datum = factory.CreateHorizontalDatum("d", DatumType.HD_Geocentric, ellipsoid, null);
        GeographicCoordinateSystem degrees = factory.CreateGeographicCoordinateSystem("g", AngularUnit.Degrees, datum, PrimeMeridian.Greenwich,
            new AxisInfo("Lon", AxisOrientationEnum.East), new AxisInfo("Lat", AxisOrientationEnum.North));
        // The meridian is measured from itself: a prime meridian elsewhere makes no difference.
        IProjection projection = factory.CreateProjection("p", "Transverse_Mercator",
        [
            new ProjectionParameter("latitude_of_origin", Value(crs, "latitude_of_origin_deg") ?? 0), new ProjectionParameter("central_meridian", 0),
            new ProjectionParameter("scale_factor", Value(crs, "scale_factor") is double s and > 0 ? s : 1),
            new ProjectionParameter("false_easting", Value(crs, "false_easting_m") ?? 0),
            new ProjectionParameter("false_northing", Value(crs, "false_northing_m") ?? 0),
        ]);
        ProjectedCoordinateSystem grid = factory.CreateProjectedCoordinateSystem("c", degrees, projection, LinearUnit.Metre,
            new AxisInfo("East", AxisOrientationEnum.East), new AxisInfo("North", AxisOrientationEnum.North));
        return new TransverseGrid(new CoordinateTransformationFactory().CreateFromCoordinateSystems(degrees, grid).MathTransform, meridian);
    }

    /// <summary>Degrees east of the central meridian and latitude [deg] of a place [m].</summary>
    public (double East, double Latitude) Back(double x, double y) => back.Transform(x, y);

    /// <summary>Place [m] of degrees east of the central meridian and latitude [deg].</summary>
    public (double X, double Y) Forward(double east, double latitude) => forward.Transform(east, latitude);

    private static double? Value(CrsInfo crs, string name) => crs.Parameters.FirstOrDefault(p => p.Name == name)?.Value;
}
