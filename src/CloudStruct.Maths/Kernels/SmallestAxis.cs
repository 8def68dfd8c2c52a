using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Kernels;

/// <summary>Eigenvalues of a symmetric 3 by 3 matrix and the axis of the smallest, in closed form: for one fit per point.</summary>
/// <remarks>Trigonometric solution (O. K. Smith 1961, Eigenvalues of a symmetric 3 × 3 matrix, Commun. ACM 4, 168; from
/// memory), axis as the largest cross product of two rows of A - λ₃ I. Loses half the digits of λ₃ against
/// <see cref="Symmetric3.Eigen"/>: absolute error about 1e-15 of the trace for values, 1e-8 rad for the axis. That is
/// ample for a local normal; refit faces with Symmetric3. Where λ₂ ≈ λ₃ the axis is arbitrary and Symmetric3 is asked.</remarks>
public static class SmallestAxis
{
    /// <summary>Eigenvalues in falling order, not below 0, and the unit axis of the smallest (sign arbitrary).</summary>
    /// <param name="a">Covariance matrix.</param>
    /// <param name="axis">[out] Unit vector; straight up for a null matrix.</param>
    public static (double L1, double L2, double L3) Of(in Symmetric3 a, out Vec3 axis)
    {
        double mean = (a.Xx + a.Yy + a.Zz) / 3;
        double dx = a.Xx - mean, dy = a.Yy - mean, dz = a.Zz - mean;
        double p2 = ((dx * dx) + (dy * dy) + (dz * dz) + (2 * ((a.Xy * a.Xy) + (a.Xz * a.Xz) + (a.Yz * a.Yz)))) / 6;
        if (!(p2 > 1e-30 * mean * mean) || !(mean > 0))
        {
            axis = Vec3.Up;
            double equal = Math.Max(0, mean);
            return (equal, equal, equal);
        }

        double p = Math.Sqrt(p2);
        double half = ((dx * ((dy * dz) - (a.Yz * a.Yz)))
            - (a.Xy * ((a.Xy * dz) - (a.Yz * a.Xz)))
            + (a.Xz * ((a.Xy * a.Yz) - (dy * a.Xz)))) / (2 * p2 * p);
        double angle = Math.Acos(Math.Clamp(half, -1, 1)) / 3;
        double l1 = mean + (2 * p * Math.Cos(angle));
        double l3 = mean + (2 * p * Math.Cos(angle + (2 * Math.PI / 3)));
        double l2 = (3 * mean) - l1 - l3;

        var r0 = new Vec3(a.Xx - l3, a.Xy, a.Xz);
        var r1 = new Vec3(a.Xy, a.Yy - l3, a.Yz);
        var r2 = new Vec3(a.Xz, a.Yz, a.Zz - l3);
        Vec3 c01 = r0.Cross(r1), c02 = r0.Cross(r2), c12 = r1.Cross(r2);
        double n01 = c01.Dot(c01), n02 = c02.Dot(c02), n12 = c12.Dot(c12);
        (Vec3 c, double n) = n01 >= n02 && n01 >= n12 ? (c01, n01) : n02 >= n12 ? (c02, n02) : (c12, n12);

        // The product's length is (λ1 - λ3)(λ2 - λ3): small means that two rows say nearly the same.
        if (n > 1e-12 * p2 * p2)
        {
            axis = c / Math.Sqrt(n);
            return (l1, l2, Math.Max(0, l3));
        }

        Eigen3 e = a.Eigen();
        axis = e.V3;
        return (e.L1, e.L2, Math.Max(0, e.L3));
    }
}
