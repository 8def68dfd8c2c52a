using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Directions;

/// <summary>Kamb's counting circle: so large that the count expected of uniform axes is m standard deviations.</summary>
/// <param name="N">Number of axes.</param>
/// <param name="M">Standard deviations; 3 is usual.</param>
/// <remarks>W. B. Kamb 1959, J. Geophys. Res. 64, 1891-1909: area fraction A = m²/(N + m²) of the hemisphere.</remarks>
public readonly record struct CountingCircle(int N, double M = 3)
{
    /// <summary>Share of the hemisphere that the circle covers.</summary>
    public double AreaFraction => M * M / (N + (M * M));

    /// <summary>Cosine of its half-angle.</summary>
    public double Cosine => 1 - AreaFraction;

    /// <summary>Count expected of uniform axes.</summary>
    public double Expected => N * AreaFraction;

    /// <summary>Standard deviation of that count.</summary>
    public double Sigma => Math.Sqrt(N * AreaFraction * (1 - AreaFraction));

    /// <summary>Axes within the circle about a node.</summary>
    public int Count(ReadOnlySpan<Vec3> axes, Vec3 node) => Count(axes, node, Cosine);

    /// <summary>Axes within a cap about a node.</summary>
    /// <param name="axes">Unit vectors of either sign.</param>
    /// <param name="node">Unit vector of either sign.</param>
    /// <param name="cosine">Cosine of the cap's half-angle; 0.99 is the classic circle of 1 % of the net.</param>
    public static int Count(ReadOnlySpan<Vec3> axes, Vec3 node, double cosine)
    {
        int count = 0;
        foreach (Vec3 a in axes) if (Math.Abs(a.Dot(node)) >= cosine) count++;
        return count;
    }
}
