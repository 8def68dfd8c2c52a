using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Directions;

/// <summary>A line by trend (clockwise from north) and plunge (down from the horizontal).</summary>
/// <param name="TrendDeg">0 ≤ trend &lt; 360.</param>
/// <param name="PlungeDeg">-90 to 90; negative points upward, which only directions, not axes, can do.</param>
public readonly record struct TrendPlunge(double TrendDeg, double PlungeDeg)
{
    private const double Degree = Math.PI / 180;

    /// <summary>Unit vector, grid frame (x east, y north, z up).</summary>
    public Vec3 ToVector()
    {
        double t = TrendDeg * Degree, p = PlungeDeg * Degree;
        return new Vec3(Math.Cos(p) * Math.Sin(t), Math.Cos(p) * Math.Cos(t), -Math.Sin(p));
    }

    /// <summary>Of a direction: an upward one has a negative plunge.</summary>
    /// <param name="v">Any length but null.</param>
    /// <param name="turnDeg">Degrees from grid to the stated north.</param>
    public static TrendPlunge OfDirection(Vec3 v, double turnDeg = 0)
    {
        double h = Math.Sqrt((v.X * v.X) + (v.Y * v.Y));
        return new TrendPlunge(Azimuth.Of(v, turnDeg), Math.Atan2(-v.Z, h) / Degree);
    }

    /// <summary>Of an axis: its end in the lower hemisphere is taken, plunge 0 to 90. The sign of the vector does not matter.</summary>
    /// <param name="v">Any length but null. A level axis has trend 0 ≤ t &lt; 180 before the turn.</param>
    /// <param name="turnDeg">Degrees from grid to the stated north.</param>
    public static TrendPlunge OfAxis(Vec3 v, double turnDeg = 0) => OfDirection(Lower(v), turnDeg);

    /// <summary>The end of an axis that lies in the lower hemisphere; of a level axis the one with azimuth in [0, 180).</summary>
    public static Vec3 Lower(Vec3 v) => v.Z > 0 || (v.Z == 0 && (v.X < 0 || (v.X == 0 && v.Y < 0))) ? -v : v;
}
