using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Attitudes;

/// <summary>Strike and dip of a plane, azimuths clockwise from the stated north.</summary>
/// <param name="StrikeDeg">Right-hand rule, 0 ≤ strike &lt; 360: dip direction minus 90.</param>
/// <param name="DipDeg">0 to 90.</param>
public readonly record struct Attitude(double StrikeDeg, double DipDeg)
{
    /// <summary>Azimuth of steepest descent, 0 ≤ a &lt; 360.</summary>
    public double DipDirectionDeg => Azimuth.Wrap360(StrikeDeg + 90);

    /// <summary>Trend of the lower-hemisphere normal: dip direction plus 180.</summary>
    public double PoleTrendDeg => Azimuth.Wrap360(StrikeDeg + 270);

    /// <summary>Plunge of the lower-hemisphere normal: 90 minus dip.</summary>
    public double PolePlungeDeg => 90 - DipDeg;

    /// <summary>Attitude of the plane with a normal in the grid frame; the sign of the normal does not matter.</summary>
    /// <param name="normal">Any length but null.</param>
    /// <param name="turnDeg">Degrees from grid to the stated north (<see cref="SurveyFrame.TurnDeg"/>).</param>
    /// <remarks>For an exactly level plane the strike is 270 + turn by convention and means nothing. For an exactly
    /// vertical plane the side with dip direction in [0, 180) is taken, so that a sign flip cannot move the strike.</remarks>
    public static Attitude FromNormal(Vec3 normal, double turnDeg = 0)
    {
        Vec3 n = normal.Unit();
        if (n.Z < 0 || (n.Z == 0 && (n.X < 0 || (n.X == 0 && n.Y < 0)))) n = -n;
        double horizontal = Math.Sqrt((n.X * n.X) + (n.Y * n.Y));
        double dip = Math.Atan2(horizontal, n.Z) * 180 / Math.PI;
        double direction = horizontal == 0 ? 0 : Math.Atan2(n.X, n.Y) * 180 / Math.PI;
        return new Attitude(Azimuth.Wrap360(direction - 90 + turnDeg), dip);
    }

    /// <summary>Upward unit normal in the grid frame.</summary>
    /// <param name="turnDeg">Degrees from grid to the stated north.</param>
    public Vec3 UpwardNormal(double turnDeg = 0)
    {
        double d = DipDeg * Math.PI / 180, a = (DipDirectionDeg - turnDeg) * Math.PI / 180;
        return new Vec3(Math.Sin(d) * Math.Sin(a), Math.Sin(d) * Math.Cos(a), Math.Cos(d));
    }
}
