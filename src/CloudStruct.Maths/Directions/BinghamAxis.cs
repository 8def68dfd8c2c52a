using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Directions;

/// <summary>What is known of an axis, as the exponent of a Bingham law: density proportional to exp(xᵀ A x).</summary>
/// <param name="Exponent">A; adding a multiple of the unit matrix changes nothing.</param>
/// <remarks>With Gaussian errors of places about a plane of unknown offset the likelihood of its normal is exp(-nᵀ S n / (2 σ²)), S
/// the scatter about the centroid: a Bingham law with A = -S / (2 σ²). Laws of independent evidence multiply, so that exponents
/// add (checked on reference values; Bingham 1974, An antipodally symmetric distribution on the sphere, from memory).</remarks>
public readonly record struct BinghamAxis(Symmetric3 Exponent)
{
    /// <summary>From the scatter of places about their centroid.</summary>
    /// <param name="scatter">Sum of outer products [m²].</param>
    /// <param name="sigmaM">Error of one place across the plane, one standard deviation [m].</param>
    /// <param name="share">Independent places over all: below 1 where errors resemble their neighbours'.</param>
    public static BinghamAxis FromScatter(Symmetric3 scatter, double sigmaM, double share = 1) => new(scatter * (-share / (2 * sigmaM * sigmaM)));

    /// <summary>A round law about an axis (Watson's): one standard deviation in each direction is 1/√(2 κ) for large κ.</summary>
    public static BinghamAxis Watson(Vec3 axis, double kappa) => new(Symmetric3.Outer(axis.Unit(), kappa));

    /// <summary>From a unit normal and the covariance of its error in the tangent plane [rad²], when both errors are small.</summary>
    public static BinghamAxis FromNormal(Vec3 normal, Symmetric3 covariance)
    {
        Vec3 n = normal.Unit();
        Vec3 u = (Math.Abs(n.Z) < 0.9 ? n.Cross(Vec3.Up) : n.Cross(new Vec3(1, 0, 0))).Unit(), v = n.Cross(u);
        double a = covariance.Form(u), b = u.Dot(covariance.Times(v)), c = covariance.Form(v), turn = 0.5 * Math.Atan2(2 * b, a - c);
        (double sin, double cos) = Math.SinCos(turn);
        Vec3 first = (u * cos) + (v * sin), second = (v * cos) - (u * sin);
        Symmetric3 sum = default;   // what lies along the normal is no error of an axis
        foreach (Vec3 axis in (ReadOnlySpan<Vec3>)[first, second]) sum += Symmetric3.Outer(axis, -0.5 / Math.Max(1e-14, covariance.Form(axis)));
        return new BinghamAxis(sum);
    }

    /// <summary>Both together.</summary>
    public BinghamAxis And(BinghamAxis other) => new(Exponent + other.Exponent);

    /// <summary>Likeliest axis.</summary>
    public Vec3 Mode => Exponent.Eigen().V1;

    /// <summary>Covariance of the axis about its mode, in the tangent plane [rad²]: mean squares of the components square to the
    /// mode under the law; 1/(2 (λ1 - λi)) when it is tight, never more than a half.</summary>
    public Symmetric3 Covariance()
    {
        Eigen3 e = Exponent.Eigen();
        (_, double third, double second) = Bingham.Integrate(e.L3 - e.L1, e.L2 - e.L1);
        return Symmetric3.Outer(e.V3, third) + Symmetric3.Outer(e.V2, second);
    }
}
