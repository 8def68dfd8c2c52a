using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Directions;

/// <summary>Weighted orientation tensor of axes, T = Σ w x xᵀ / Σ w, with trace 1. Signs of the axes do not matter.</summary>
/// <param name="Tensor">The tensor; null matrix without weight.</param>
/// <param name="Eigen">S1 ≥ S2 ≥ S3 with sum 1; V1 is the mean axis of a cluster, V3 the pole of a girdle.</param>
/// <param name="Weight">Σ w.</param>
/// <param name="NEffective">(Σ w)² / Σ w²: the number of equally weighted axes that they are worth; 0 without weight.</param>
public readonly record struct OrientationTensor(Symmetric3 Tensor, Eigen3 Eigen, double Weight, double NEffective)
{
    /// <summary>Mean axis, its lower end.</summary>
    public Vec3 MeanAxis => TrendPlunge.Lower(Eigen.V1);

    /// <summary>Largest normalised eigenvalue.</summary>
    public double S1 => Eigen.L1;

    /// <summary>Middle normalised eigenvalue.</summary>
    public double S2 => Eigen.L2;

    /// <summary>Smallest normalised eigenvalue, never below 0.</summary>
    public double S3 => Math.Max(0, Eigen.L3);

    /// <summary>Shape K = ln(S1/S2)/ln(S2/S3), above 1 a cluster, below 1 a girdle, and strength C = ln(S1/S3), 0 when uniform.</summary>
    /// <remarks>Woodcock 1977, Geol. Soc. Am. Bull. 88, 1231-1236. K is +∞ for S2 = S3, NaN for S1 = S2 = S3; both are
    /// infinite or NaN when S3 is 0 (fewer than three different axes).</remarks>
    public (double Shape, double Strength) Woodcock => WoodcockOf(S1, S2, S3);

    /// <summary>Tensor of equally weighted unit axes.</summary>
    public static OrientationTensor Of(ReadOnlySpan<Vec3> axes) => Of(axes, []);

    /// <summary>Tensor of weighted unit axes.</summary>
    /// <param name="axes">Unit vectors of either sign.</param>
    /// <param name="weights">As long as the axes, none negative; empty: all 1.</param>
    public static OrientationTensor Of(ReadOnlySpan<Vec3> axes, ReadOnlySpan<double> weights)
    {
        var sum = default(Symmetric3);
        double w1 = 0, w2 = 0;
        for (int i = 0; i < axes.Length; i++)
        {
            double w = weights.IsEmpty ? 1 : weights[i];
            sum += Symmetric3.Outer(axes[i], w);
            w1 += w;
            w2 += w * w;
        }

        Symmetric3 tensor = w1 > 0 ? sum * (1 / w1) : default;
        return new OrientationTensor(tensor, tensor.Eigen(), w1, w2 > 0 ? w1 * w1 / w2 : 0);
    }

    /// <summary>Woodcock's shape and strength from normalised eigenvalues in falling order.</summary>
    public static (double Shape, double Strength) WoodcockOf(double s1, double s2, double s3) =>
        (Math.Log(s1 / s2) / Math.Log(s2 / s3), Math.Log(s1 / s3));
}
