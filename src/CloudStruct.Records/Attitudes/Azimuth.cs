using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Attitudes;

/// <summary>Azimuths in degrees, clockwise from north.</summary>
public static class Azimuth
{
    /// <summary>Into 0 ≤ a &lt; 360.</summary>
    public static double Wrap360(double deg)
    {
        double a = deg % 360;
        if (a < 0) a += 360;
        return a >= 360 ? 0 : a;   // -1e-17 + 360 rounds to 360
    }

    /// <summary>Into 0 ≤ a &lt; 180, for axes.</summary>
    public static double Wrap180(double deg)
    {
        double a = deg % 180;
        if (a < 0) a += 180;
        return a >= 180 ? 0 : a;
    }

    /// <summary>Grid azimuth of the horizontal part of a vector plus a turn, 0 ≤ a &lt; 360; 0 for a vertical vector.</summary>
    public static double Of(Vec3 v, double turnDeg = 0) =>
        v is { X: 0, Y: 0 } ? Wrap360(turnDeg) : Wrap360((Math.Atan2(v.X, v.Y) * 180 / Math.PI) + turnDeg);
}
