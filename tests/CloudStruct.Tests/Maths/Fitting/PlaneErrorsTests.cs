using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Maths.Fitting;

public class PlaneErrorsTests
{
    private const double Degree = Math.PI / 180;

    // plane_fit_points.csv, plane_fit_answers.csv: 50-digit eigenvalues (mpmath) and se = rms / sqrt((n - 3) lambda).
    [Theory]
    [InlineData("near_origin")]
    [InlineData("subhorizontal")]
    [InlineData("utm_offset")]
    public void Standard_errors_under_independent_noise_follow_the_formula(string set)
    {
        ReferenceTable points = ReferenceTable.Read("reference/plane_fit_points.csv");
        ReferenceTable answers = ReferenceTable.Read("reference/plane_fit_answers.csv");
        Vec3[] places = [.. Enumerable.Range(0, points.Count).Where(r => points.Text(r, "set") == set)
            .Select(r => new Vec3(points.Number(r, "x"), points.Number(r, "y"), points.Number(r, "z")))];

        (double aboutLong, double aboutShort) = PlaneErrors.Independent(PlaneFit.To(places));

        Assert.Equal(answers.Of(set, "se_about_long_axis_deg"), aboutLong / Degree, 1e-6);
        Assert.Equal(answers.Of(set, "se_about_short_axis_deg"), aboutShort / Degree, 1e-6);
    }

    // plane_correlated_noise.csv: exact sandwich on a 20 x 20 grid, step 0.1 m, sigma 0.01 m, covariance exp(-d/L) (numpy).
    [Fact]
    public void Sandwich_gives_the_exact_error_under_correlated_noise()
    {
        ReferenceTable table = ReferenceTable.Read("reference/plane_correlated_noise.csv");
        (double[] u, double[] v) = Grid20();
        for (int row = 0; row < table.Count; row++)
        {
            double length = table.Number(row, "corr_length_m");
            Symmetric3 c = PlaneErrors.Sandwich(u, v, d => 1e-4 * (d == 0 ? 1 : length == 0 ? 0 : Math.Exp(-d / length)));
            Assert.Equal(table.Number(row, "true_se_deg"), Math.Sqrt(c.Yy) / Degree, 1e-6);
            Assert.Equal(c.Yy, c.Zz, 1e-12);
        }
    }

    /// <summary>The grid of the reference tables: 20 x 20, step 0.1 m.</summary>
    internal static (double[] U, double[] V) Grid20()
    {
        var u = new double[400];
        var v = new double[400];
        for (int i = 0; i < 400; i++) (u[i], v[i]) = (i % 20 * 0.1, i / 20 * 0.1);
        return (u, v);
    }
}
