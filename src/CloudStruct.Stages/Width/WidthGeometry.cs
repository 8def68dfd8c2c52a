using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Width;

/// <summary>Widths of a sheet as they follow from each other.</summary>
internal static class WidthGeometry
{
    /// <summary>Horizontal width across strike [m]: the true width over the sine of the dip; null for a dip below 5 deg.</summary>
    public static double? Apparent(Vec3 normal, double trueWidthM)
    {
        Vec3 n = normal.Unit();
        double sine = Math.Sqrt((n.X * n.X) + (n.Y * n.Y));
        return sine < Math.Sin(5 * Math.PI / 180) ? null : trueWidthM / sine;
    }
}
