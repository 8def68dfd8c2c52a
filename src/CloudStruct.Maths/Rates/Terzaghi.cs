namespace CloudStruct.Maths.Rates;

/// <summary>How much more rarely a plane is met the more nearly it lies along what samples it.</summary>
/// <remarks>R. D. Terzaghi 1965, Geotechnique 15, 287-304 (from memory): on a line, planes at an angle a to it are met in
/// proportion to sin a. On a surface the length of trace goes with the sine of the angle between plane and surface.</remarks>
public static class Terzaghi
{
    /// <summary>Weight 1/sin a, capped.</summary>
    /// <param name="angleDeg">Angle between the plane and the line, or the surface [deg], 0 to 90.</param>
    /// <param name="most">Largest weight: 10 is reached at 5.74 deg.</param>
    public static double Weight(double angleDeg, double most = 10) => Capped(Math.Sin(angleDeg * Math.PI / 180), most);

    /// <summary>The same from the sine, or from the mean sine over an uneven surface.</summary>
    public static double Capped(double sine, double most = 10) => sine * most > 1 ? 1 / sine : most;
}
