using CloudStruct.Records.Frame;

namespace CloudStruct.Simulate.Chance;

/// <summary>Directions from and to degrees: the simulator's own, so that a slip in the program's cannot cancel out.</summary>
internal static class Axes
{
    private const double Rad = Math.PI / 180;

    /// <summary>Level unit vector toward an azimuth clockwise from grid north.</summary>
    public static Vec3 Toward(double azimuthDeg) => new(Math.Sin(azimuthDeg * Rad), Math.Cos(azimuthDeg * Rad), 0);

    /// <summary>Upward normal of a plane dipping toward an azimuth.</summary>
    public static Vec3 Pole(double dipDirectionDeg, double dipDeg) =>
        (Toward(dipDirectionDeg) * Math.Sin(dipDeg * Rad)) + new Vec3(0, 0, Math.Cos(dipDeg * Rad));

    /// <summary>Two unit vectors that are square to a unit vector and to each other.</summary>
    public static (Vec3 First, Vec3 Second) Beside(Vec3 n)
    {
        Vec3 other = Math.Abs(n.X) < 0.6 ? new Vec3(1, 0, 0) : new Vec3(0, 1, 0);
        Vec3 first = n.Cross(other).Unit();
        return (first, n.Cross(first));
    }
}
