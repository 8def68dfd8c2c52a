using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;
using MathNet.Numerics.Distributions;
using MathNet.Numerics.Statistics;

namespace CloudStruct.Maths.Directions;

/// <summary>The rotation that carries one group of poles onto another, pair by pair, with its covariance.</summary>
/// <param name="Vector">Rotation vector [rad]: direction of the axis, length the angle, right-handed. First turned by it gives second.</param>
/// <param name="Covariance">Its covariance [rad²], from the scatter of the pairs.</param>
/// <param name="Pairs">Pairs it rests on.</param>
/// <remarks>Weighted least squares on the sphere: a small turn t moves a pole a by t × a, so that the normal equations are
/// Σ w (I - a aᵀ) t = Σ w a × b; solved anew from the turned poles until nothing moves. Weights fall as 1/r beyond two
/// standard deviations (Huber 1964), scale by the median. The covariance is the sandwich over pairs, so that stated errors need not be true.</remarks>
public sealed record CommonRotation(Vec3 Vector, Symmetric3 Covariance, int Pairs)
{
    /// <summary>Fewest pairs: three unknowns, two equations each, and some left over for the scatter.</summary>
    public const int FewestPairs = 5;

    /// <summary>Share of the weight that must lie off every single axis: poles all along one line leave the turn about it open.</summary>
    private const double LeastSpread = 0.02;

    /// <summary>Half-width of the 95 % interval of a component along a unit direction [rad].</summary>
    public double HalfWidth(Vec3 direction) => StudentT.InvCDF(0, 1, (2 * Pairs) - 3, 0.975) * Math.Sqrt(Math.Max(0, Covariance.Form(direction)));

    /// <summary>Finds it.</summary>
    /// <param name="first">Unit axes.</param>
    /// <param name="second">Their partners; the sign of either does not matter.</param>
    /// <param name="sigma">Stated standard deviation of each difference [rad], above 0; only their ratios matter.</param>
    /// <returns>Null with too few pairs, or when all poles lie too near to one axis.</returns>
    public static CommonRotation? Of(ReadOnlySpan<Vec3> first, ReadOnlySpan<Vec3> second, ReadOnlySpan<double> sigma)
    {
        int n = first.Length;
        if (n < FewestPairs) return null;
        var total = default(Vec3);
        var r = new double[n];
        Symmetric3 inverse = default;
        var meat = default(Symmetric3);
        for (int round = 0; round < 30; round++)
        {
            for (int i = 0; i < n; i++) r[i] = Rest(Turn(first[i], total), second[i]).Length / sigma[i];
            double scale = Statistics.Median(r) / 1.177;   // Rayleigh: the median is 1.177 standard deviations
            var h = default(Symmetric3);
            var g = default(Vec3);
            meat = default;
            double weights = 0;
            for (int i = 0; i < n; i++)
            {
                Vec3 a = Turn(first[i], total);
                double w = Math.Min(1, 2 * Math.Max(scale, 1e-9) / Math.Max(r[i], 1e-12)) / (sigma[i] * sigma[i]);
                h += new Symmetric3(1, 0, 0, 1, 0, 1) * w + Symmetric3.Outer(a, -w);
                Vec3 pull = a.Cross(Rest(a, second[i])) * w;
                g += pull;
                meat += Symmetric3.Outer(pull);
                weights += w;
            }

            if (h.Eigen().L3 < LeastSpread * weights) return null;
            inverse = h.Inverse();
            Vec3 step = inverse.Times(g);
            total = Compose(step, total);
            if (step.Length < 1e-12) break;
        }

        return new CommonRotation(total, inverse.Around(meat) * (n / (n - 1.5)), n);
    }

    /// <summary>A vector turned by a rotation vector [rad].</summary>
    public static Vec3 Turn(Vec3 v, Vec3 rotation)
    {
        double angle = rotation.Length;
        if (angle == 0) return v;
        Vec3 k = rotation * (1 / angle);
        (double s, double c) = Math.SinCos(angle);
        return (v * c) + (k.Cross(v) * s) + (k * (k.Dot(v) * (1 - c)));
    }

    // What is missing from a to the axis b, in the plane square to a.
    private static Vec3 Rest(Vec3 a, Vec3 b)
    {
        Vec3 near = a.Dot(b) < 0 ? -b : b;
        return near - (a * a.Dot(near));
    }

    /// <summary>Rotation vector of "first by b, then by a", by quaternions [rad].</summary>
    public static Vec3 Compose(Vec3 a, Vec3 b)
    {
        (double aw, Vec3 av) = Quaternion(a);
        (double bw, Vec3 bv) = Quaternion(b);
        double w = (aw * bw) - av.Dot(bv);
        Vec3 v = (bv * aw) + (av * bw) + av.Cross(bv);
        if (w < 0) (w, v) = (-w, -v);
        double s = v.Length;
        return s < 1e-15 ? v * 2 : v * (2 * Math.Atan2(s, w) / s);
    }

    private static (double W, Vec3 V) Quaternion(Vec3 rotation)
    {
        double angle = rotation.Length;
        return angle < 1e-12 ? (1, rotation * 0.5) : (Math.Cos(angle / 2), rotation * (Math.Sin(angle / 2) / angle));
    }
}
