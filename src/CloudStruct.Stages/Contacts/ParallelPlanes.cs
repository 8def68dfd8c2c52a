using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Contacts;

/// <summary>One normal for both margins, each with its own centroid, by orthogonal least squares.</summary>
/// <param name="Normal">Unit normal with z ≥ 0.</param>
/// <param name="Eigen">Pooled scatter divided by the number of points [m²]: the first two say how long the evidence is and how
/// far it departs from a line, the third how far from a plane.</param>
/// <param name="CentroidA">Mean of A; NaN without points.</param>
/// <param name="CentroidB">Mean of B; NaN without points.</param>
/// <remarks>Shakarji and Srinivasan, weighted total least squares for planes and parallel planes: one centroid per plane, scatter
/// pooled.</remarks>
internal readonly record struct ParallelPlanes(Vec3 Normal, Eigen3 Eigen, Vec3 CentroidA, Vec3 CentroidB)
{
    /// <summary>Distance of the two planes [m]: n · (cB - cA), positive when B lies where the normal points.</summary>
    public double WidthM => Normal.Dot(CentroidB - CentroidA);

    /// <summary>Fits; either side may be empty.</summary>
    public static ParallelPlanes To(IReadOnlyList<Vec3> a, IReadOnlyList<Vec3> b)
    {
        Symmetric3 scatter = default;
        var centroid = new Vec3[2];
        int count = a.Count + b.Count;
        for (int side = 0; side < 2; side++)
        {
            IReadOnlyList<Vec3> places = side == 0 ? a : b;
            centroid[side] = places.Aggregate(default(Vec3), (sum, p) => sum + p) / places.Count;
            foreach (Vec3 p in places) scatter += Symmetric3.Outer(p - centroid[side], 1.0 / count);
        }

        Eigen3 e = scatter.Eigen();
        return new ParallelPlanes(e.V3.Z < 0 ? -e.V3 : e.V3, e, centroid[0], centroid[1]);
    }
}
