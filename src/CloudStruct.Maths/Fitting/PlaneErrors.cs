using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Fitting;

/// <summary>Errors of a fitted plane when the covariance of the points' errors is known.</summary>
public static class PlaneErrors
{
    /// <summary>Standard errors of the normal under independent errors of the points [rad]: turn about the long axis of the
    /// points (carried by the short extent) and about the short axis.</summary>
    /// <param name="fit">Fit of more than three points of equal weight.</param>
    /// <returns>s / sqrt((n - 3) l) with s² the smallest, l the middle and the largest variance. Far too small on
    /// image-matched clouds, whose errors are correlated: see <see cref="Sandwich"/>.</returns>
    public static (double AboutLong, double AboutShort) Independent(in PlaneFit fit)
    {
        double freedom = fit.Count - 3;
        return (fit.RmsM / Math.Sqrt(freedom * fit.Eigen.L2), fit.RmsM / Math.Sqrt(freedom * fit.Eigen.L1));
    }

    /// <summary>Covariance of (offset, slope along u, slope along v) of the least-squares plane: H Aᵀ S A H with A = [1 u v],
    /// H = (Aᵀ A)⁻¹ and S[i, j] = covariance(distance of i and j).</summary>
    /// <param name="u">First coordinate in the plane [m].</param>
    /// <param name="v">Second coordinate in the plane [m].</param>
    /// <param name="covariance">Covariance of the errors along the normal at a distance [m²]; its value at 0 is the variance.</param>
    /// <remarks>Every pair is visited: for checks and small sets. <see cref="PatchModes"/> does the same on a raster.</remarks>
    public static Symmetric3 Sandwich(ReadOnlySpan<double> u, ReadOnlySpan<double> v, Func<double, double> covariance)
    {
        var scatter = default(Symmetric3);
        var middle = default(Symmetric3);
        for (int i = 0; i < u.Length; i++)
        {
            var ai = new Vec3(1, u[i], v[i]);
            scatter += Symmetric3.Outer(ai);
            var row = default(Vec3);
            for (int j = 0; j < u.Length; j++)
            {
                double du = u[i] - u[j], dv = v[i] - v[j];
                row += new Vec3(1, u[j], v[j]) * covariance(Math.Sqrt((du * du) + (dv * dv)));
            }

            middle += new Symmetric3(
                ai.X * row.X,
                ((ai.X * row.Y) + (ai.Y * row.X)) / 2,
                ((ai.X * row.Z) + (ai.Z * row.X)) / 2,
                ai.Y * row.Y,
                ((ai.Y * row.Z) + (ai.Z * row.Y)) / 2,
                ai.Z * row.Z);
        }

        return scatter.Inverse().Around(middle);
    }
}
