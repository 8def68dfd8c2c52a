using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Fitting;

/// <summary>A plane by orthogonal least squares: through the centroid, square to the direction of least scatter.</summary>
/// <param name="Centroid">A place on the plane.</param>
/// <param name="Normal">Unit normal with z ≥ 0.</param>
/// <param name="Eigen">Scatter of the points, variances [m²].</param>
/// <param name="Count">Points, or sum of weights.</param>
public readonly record struct PlaneFit(Vec3 Centroid, Vec3 Normal, Eigen3 Eigen, double Count)
{
    /// <summary>Rms orthogonal distance [m]: the root of the smallest variance.</summary>
    public double RmsM => Math.Sqrt(Math.Max(0, Eigen.L3));

    /// <summary>Signed distance of a place [m], positive where the normal points.</summary>
    public double Distance(Vec3 p) => Normal.Dot(p - Centroid);

    /// <summary>Fit from sums. Needs three points that are not in a line; a line gives an arbitrary plane through it
    /// (see <see cref="Eigen3.L2"/>).</summary>
    /// <remarks>C. M. Shakarji 1998, J. Res. NIST 103(6), 633-641.</remarks>
    public static PlaneFit From(in Moments sums)
    {
        Eigen3 e = sums.Covariance.Eigen();
        Vec3 n = e.V3.Z < 0 || (e.V3.Z == 0 && (e.V3.X < 0 || (e.V3.X == 0 && e.V3.Y < 0))) ? -e.V3 : e.V3;
        return new PlaneFit(sums.Centroid, n, e, sums.Weight);
    }

    /// <summary>Fit to places.</summary>
    /// <param name="places">At least three.</param>
    public static PlaneFit To(ReadOnlySpan<Vec3> places)
    {
        var mean = new Vec3();
        foreach (Vec3 p in places) mean += p;
        mean /= Math.Max(1, places.Length);
        var sums = new Moments(mean);
        foreach (Vec3 p in places) sums.Add(p.X, p.Y, p.Z);
        return From(sums);
    }
}
