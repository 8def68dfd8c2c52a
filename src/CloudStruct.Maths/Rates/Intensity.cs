using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Rates;

/// <summary>From what is counted on lines and surfaces to area per volume (P32): P10 = P32 E|cos|, P21 = P32 E sin.</summary>
/// <remarks>Definitions of Dershowitz and Herda 1992 (from memory). The means are over the area of the planes, of the angle
/// between their poles and the line (cosine) or the pole of the surface (sine).</remarks>
public static class Intensity
{
    /// <summary>Below this factor a line or surface is too nearly along the planes to tell their P32.</summary>
    public const double LeastFactor = 0.2;

    /// <summary>P10 over P32 for a line.</summary>
    /// <param name="poles">Unit poles of either sign.</param>
    /// <param name="weights">Area of each plane.</param>
    /// <param name="line">Unit vector along the line.</param>
    public static double LineFactor(ReadOnlySpan<Vec3> poles, ReadOnlySpan<double> weights, Vec3 line)
    {
        double sum = 0, all = 0;
        for (int i = 0; i < poles.Length; i++)
        {
            sum += weights[i] * Math.Abs(poles[i].Dot(line));
            all += weights[i];
        }

        return sum / all;
    }

    /// <summary>P21 over P32 for a plane.</summary>
    /// <param name="poles">Unit poles of either sign.</param>
    /// <param name="weights">Area of each plane.</param>
    /// <param name="pole">Unit pole of the surface.</param>
    public static double SurfaceFactor(ReadOnlySpan<Vec3> poles, ReadOnlySpan<double> weights, Vec3 pole)
    {
        double sum = 0, all = 0;
        for (int i = 0; i < poles.Length; i++)
        {
            sum += weights[i] * poles[i].Cross(pole).Length;
            all += weights[i];
        }

        return sum / all;
    }
}
