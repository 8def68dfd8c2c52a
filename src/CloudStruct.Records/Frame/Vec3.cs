using static System.FormattableString;

namespace CloudStruct.Records.Frame;

/// <summary>A vector or a place in double precision: x east, y north, z up, metres (or unitless for directions).</summary>
/// <param name="X">East.</param>
/// <param name="Y">North.</param>
/// <param name="Z">Up.</param>
public readonly record struct Vec3(double X, double Y, double Z)
{
    /// <summary>Straight up.</summary>
    public static Vec3 Up => new(0, 0, 1);

    /// <summary>Length [m].</summary>
    public double Length => Math.Sqrt(Dot(this));

    /// <summary>Scalar product.</summary>
    public double Dot(Vec3 o) => (X * o.X) + (Y * o.Y) + (Z * o.Z);

    /// <summary>Vector product, right-handed.</summary>
    public Vec3 Cross(Vec3 o) => new((Y * o.Z) - (Z * o.Y), (Z * o.X) - (X * o.Z), (X * o.Y) - (Y * o.X));

    /// <summary>Same direction, length 1. NaN for the null vector.</summary>
    public Vec3 Unit() => this / Length;

    /// <summary>Sum.</summary>
    public static Vec3 operator +(Vec3 a, Vec3 b) => new(a.X + b.X, a.Y + b.Y, a.Z + b.Z);

    /// <summary>Difference.</summary>
    public static Vec3 operator -(Vec3 a, Vec3 b) => new(a.X - b.X, a.Y - b.Y, a.Z - b.Z);

    /// <summary>Opposite.</summary>
    public static Vec3 operator -(Vec3 a) => new(-a.X, -a.Y, -a.Z);

    /// <summary>Multiple.</summary>
    public static Vec3 operator *(Vec3 a, double k) => new(a.X * k, a.Y * k, a.Z * k);

    /// <summary>Multiple.</summary>
    public static Vec3 operator *(double k, Vec3 a) => a * k;

    /// <summary>Quotient.</summary>
    public static Vec3 operator /(Vec3 a, double k) => new(a.X / k, a.Y / k, a.Z / k);

    /// <inheritdoc/>
    public override string ToString() => Invariant($"({X}, {Y}, {Z})");
}
