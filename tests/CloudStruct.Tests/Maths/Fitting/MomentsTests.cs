using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;

namespace CloudStruct.Tests.Maths.Fitting;

public sealed class MomentsTests
{
    [Fact]
    public void Sums_near_a_plane_are_those_of_single_points_with_bisquare_weights()
    {
        var draws = new Draws(7, 1, 1);
        float[] x = new float[500], y = new float[500], z = new float[500];
        for (int i = 0; i < x.Length; i++) (x[i], y[i], z[i]) = ((float)draws.NextNormal(), (float)draws.NextNormal(), (float)(0.1 * draws.NextNormal()));
        int[] some = [.. Enumerable.Range(0, 250).Select(i => 2 * i)];
        Vec3[] places = [.. some.Select(i => new Vec3(x[i], y[i], z[i]))];
        PlaneFit plane = PlaneFit.To(places);
        const double limit = 0.15;
        Moments wanted = new(new Vec3(0.1, 0.2, 0.3)), byPlaces = wanted, byNumbers = wanted;
        foreach (Vec3 p in places) wanted.Add(p.X, p.Y, p.Z, RobustPlane.Weight(plane.Distance(p) / limit));
        byPlaces.AddNear(places, plane, limit);
        byNumbers.AddNear(x, y, z, some, plane, limit);
        Assert.InRange(wanted.Weight, 50, 249);
        Assert.Equal((wanted.Weight, wanted.Centroid, wanted.Covariance), (byPlaces.Weight, byPlaces.Centroid, byPlaces.Covariance));
        Assert.Equal((wanted.Weight, wanted.Centroid, wanted.Covariance), (byNumbers.Weight, byNumbers.Centroid, byNumbers.Covariance));
    }
}
