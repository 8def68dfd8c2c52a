using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Maths.Fitting;

public class RobustPlaneTests
{
    // r_robust_plane_points.csv with 30 % gross outliers; MM fit by robustbase::lmrob 0.95-0 in r_robust_plane_fits.csv.
    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(3)]
    public void Mm_plane_agrees_with_lmrob_where_least_squares_is_pulled_away(ulong seed)
    {
        ReferenceTable points = ReferenceTable.Read("reference/r_robust_plane_points.csv");
        ReferenceTable fits = ReferenceTable.Read("reference/r_robust_plane_fits.csv");
        Vec3[] places = [.. Enumerable.Range(0, points.Count)
            .Select(r => new Vec3(points.Number(r, "x"), points.Number(r, "y"), points.Number(r, "z")))];
        const string Mm = "MM (robustbase::lmrob)";

        (double intercept, double bx, double by) = AsGraph(RobustPlane.FitMm(places, seed).Plane);
        (double plain, _, _) = AsGraph(PlaneFit.To(places));

        Assert.Equal(fits.Of(Mm, "intercept"), intercept, 0.01);
        Assert.Equal(fits.Of(Mm, "bx"), bx, 0.01);
        Assert.Equal(fits.Of(Mm, "by"), by, 0.01);
        Assert.True(Math.Abs(plain - 1.5) > 0.2, "the outliers must matter");
    }

    // ransac_trials.csv: ln(1 - p) / ln(1 - w³), Fischler and Bolles 1981.
    [Fact]
    public void Number_of_triplets_follows_the_published_table()
    {
        ReferenceTable table = ReferenceTable.Read("reference/ransac_trials.csv");
        for (int row = 0; row < table.Count; row++)
        {
            double outliers = table.Number(row, "outlier_fraction");
            Assert.Equal((int)table.Number(row, "trials_p0.99"), RobustPlane.TrialsNeeded(outliers, 0.99));
            Assert.Equal((int)table.Number(row, "trials_p0.999"), RobustPlane.TrialsNeeded(outliers, 0.999));
        }
    }

    [Fact]
    public void Three_points_give_their_plane_and_a_line_gives_some_plane_through_it()
    {
        Assert.Equal(0, RobustPlane.FitMm([new(0, 0, 0), new(1, 0, 0), new(0, 1, 0)], 1).Plane.RmsM, 1e-12);
        Vec3[] line = [.. Enumerable.Range(0, 20).Select(i => new Vec3(i, 2 * i, 3 * i))];
        PlaneFit fit = RobustPlane.FitMm(line, 1).Plane;
        Assert.All(line, p => Assert.Equal(0, fit.Distance(p), 1e-9));
    }

    private static (double Intercept, double Bx, double By) AsGraph(PlaneFit f)
    {
        double bx = -f.Normal.X / f.Normal.Z, by = -f.Normal.Y / f.Normal.Z;
        return (f.Centroid.Z - (bx * f.Centroid.X) - (by * f.Centroid.Y), bx, by);
    }
}
