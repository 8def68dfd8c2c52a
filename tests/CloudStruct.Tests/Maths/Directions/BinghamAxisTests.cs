using CloudStruct.Maths.Directions;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Frame;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Maths.Directions;

// Check L11 of the project's list: points and answers in testdata/reference/contacts.md (numpy eigh; errors of 0.02 m).
public class BinghamAxisTests
{
    private const double Degree = Math.PI / 180;

    private static Symmetric3 Scatter(params (string Margin, string? Face)[] groups)
    {
        ReferenceTable points = ReferenceTable.Read("reference/contact_points.csv");
        Symmetric3 sum = default;
        foreach ((string margin, string? face) in groups)
        {
            Vec3[] own = [.. Enumerable.Range(0, points.Count).Where(i => points.Text(i, "margin") == margin && (face is null || points.Text(i, "face") == face))
                .Select(i => new Vec3(points.Number(i, "x"), points.Number(i, "y"), points.Number(i, "z")))];
            Vec3 middle = own.Aggregate(default(Vec3), (s, p) => s + p) / own.Length;
            foreach (Vec3 p in own) sum += Symmetric3.Outer(p - middle);
        }

        return sum;
    }

    private static double[] Sigmas(BinghamAxis axis)
    {
        Eigen3 e = axis.Covariance().Eigen();
        return [Math.Sqrt(e.L2) / Degree, Math.Sqrt(e.L1) / Degree];
    }

    [Fact]
    public void Both_margins_give_312_101_and_81_314()
    {
        BinghamAxis axis = BinghamAxis.FromScatter(Scatter(("A", null), ("B", null)), 0.02);
        Attitude a = Attitude.FromNormal(axis.Mode);
        Assert.Equal(312.100572916, a.DipDirectionDeg, 1e-6);
        Assert.Equal(81.3141766427, a.DipDeg, 1e-6);
        Assert.Equal(0.0597299723455, Sigmas(axis)[0], 1e-4);
        Assert.Equal(0.453627691891, Sigmas(axis)[1], 1e-3);
    }

    [Fact]
    public void A_prior_mends_the_trace_that_is_too_straight()
    {
        BinghamAxis trace = BinghamAxis.FromScatter(Scatter(("A", "floor")), 0.02);
        Assert.True(Sigmas(trace)[1] > 20);   // 25.6 deg by the curvature at the mode; the law itself is bounded
        BinghamAxis both = trace.And(BinghamAxis.Watson(new Attitude(318 - 90, 78).UpwardNormal(), 100));
        Attitude a = Attitude.FromNormal(both.Mode);
        Assert.Equal(312.076923405, a.DipDirectionDeg, 1e-6);
        Assert.Equal(78.6347666119, a.DipDeg, 1e-6);
        Assert.Equal(0.116646506587, Sigmas(both)[0], 1e-3);
        Assert.Equal(4.03320289716, Sigmas(both)[1], 0.03);   // curvature at the mode; ours is the root mean square of the law
    }

    [Fact]
    public void A_tight_covariance_survives_the_way_through_the_law_and_half_as_many_independent_places_double_it()
    {
        Vec3 n = new Vec3(0.3, -0.5, 0.8).Unit(), u = n.Cross(Vec3.Up).Unit(), v = n.Cross(u), w = ((u * 0.6) + (v * 0.8)).Unit();
        Symmetric3 covariance = Symmetric3.Outer(w, 1e-4) + Symmetric3.Outer(n.Cross(w), 4e-6);
        BinghamAxis axis = BinghamAxis.FromNormal(n, covariance);
        Assert.Equal(1, Math.Abs(axis.Mode.Dot(n)), 1e-12);
        Assert.Equal(1e-4, axis.Covariance().Form(w), 1e-7);
        Assert.Equal(4e-6, axis.Covariance().Form(n.Cross(w)), 1e-8);
        Symmetric3 scatter = Scatter(("A", null), ("B", null));
        double whole = Sigmas(BinghamAxis.FromScatter(scatter, 0.02))[1], half = Sigmas(BinghamAxis.FromScatter(scatter, 0.02, 0.5))[1];
        Assert.Equal(Math.Sqrt(2), half / whole, 1e-3);
    }
}
