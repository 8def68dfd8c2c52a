using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Frame;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Maths.Fitting;

public class PlaneFitTests
{
    private static readonly ReferenceTable Points = ReferenceTable.Read("reference/plane_fit_points.csv");
    private static readonly ReferenceTable Answers = ReferenceTable.Read("reference/plane_fit_answers.csv");

    // 50-digit solutions by mpmath eigsy (testdata/reference/points.md). Normal 1e-6 deg near the origin, 1e-4 deg at UTM size.
    [Theory]
    [InlineData("near_origin", 1e-6)]
    [InlineData("utm_offset", 1e-4)]
    [InlineData("subhorizontal", 1e-6)]
    [InlineData("vertical", 1e-4)]
    public void Fits_equal_the_fifty_digit_solution(string set, double toleranceDeg)
    {
        PlaneFit plane = PlaneFit.To(Set(set));
        var normal = new Vec3(Answers.Of(set, "nx"), Answers.Of(set, "ny"), Answers.Of(set, "nz"));
        double sine = plane.Normal.Cross(normal).Length;   // arc cosine would lose half the digits
        Assert.True(Math.Asin(sine) * 180 / Math.PI < toleranceDeg, $"normal differs by {Math.Asin(sine) * 180 / Math.PI} deg");
        Assert.Equal(Answers.Of(set, "cx"), plane.Centroid.X, 1e-6);
        Assert.Equal(Answers.Of(set, "cy"), plane.Centroid.Y, set == "utm_offset" ? 5e-6 : 1e-6);   // printed to 12 digits: 6651234.52276
        Assert.Equal(Answers.Of(set, "cz"), plane.Centroid.Z, 1e-6);
        Assert.Equal(Answers.Of(set, "rms"), plane.RmsM, 1e-6);
        Assert.Equal(Answers.Of(set, "dip"), Attitude.FromNormal(plane.Normal).DipDeg, toleranceDeg);
        Assert.Equal(Answers.Of(set, "dip_direction"), Attitude.FromNormal(plane.Normal).DipDirectionDeg, toleranceDeg * 10);
    }

    // A vertical plane without noise: dip exactly 90, dip direction 90 or 270, nothing that is not a number.
    [Fact]
    public void Vertical_plane_without_noise_dips_exactly_90()
    {
        PlaneFit plane = PlaneFit.To(Set("vertical"));
        Attitude attitude = Attitude.FromNormal(plane.Normal);
        Assert.Equal(90, attitude.DipDeg);
        Assert.Contains(attitude.DipDirectionDeg, new[] { 90.0, 270.0 });
        Assert.True(plane.RmsM < 1e-6);
    }

    [Theory]
    [InlineData("near_origin")]
    [InlineData("subhorizontal")]
    public void Order_and_rigid_motion_do_not_change_the_attitude(string set)
    {
        Vec3[] places = Set(set);
        PlaneFit first = PlaneFit.To(places);
        PlaneFit backwards = PlaneFit.To([.. places.Reverse()]);
        Assert.True(first.Normal.Cross(backwards.Normal).Length < 1.7e-11);   // 1e-9 deg

        // A quarter turn about the vertical and a shift: east becomes north. Dip stays, direction turns by -90.
        PlaneFit turned = PlaneFit.To([.. places.Select(p => new Vec3(-p.Y + 7, p.X - 3, p.Z + 1))]);
        Attitude a = Attitude.FromNormal(first.Normal), b = Attitude.FromNormal(turned.Normal);
        Assert.Equal(a.DipDeg, b.DipDeg, 1e-9);
        Assert.Equal(0, Math.IEEERemainder(a.DipDirectionDeg - 90 - b.DipDirectionDeg, 360), 1e-8);
        Assert.Equal(first.RmsM, turned.RmsM, 1e-12);
    }

    // Standard error of the pole under independent noise: rms_n / sqrt((n - 3) λ), against the columns of the answers, and
    // 5 % against the scatter of the simulated fits named in the source (0.1374 and 0.5635 deg against 0.1389 and 0.5540).
    [Theory]
    [InlineData("near_origin")]
    [InlineData("utm_offset")]
    [InlineData("subhorizontal")]
    public void Eigenvalues_give_the_standard_error_of_independent_noise(string set)
    {
        PlaneFit plane = PlaneFit.To(Set(set));
        double Se(double inPlane) => plane.RmsM / Math.Sqrt((plane.Count - 3) * inPlane) * 180 / Math.PI;
        Assert.Equal(Answers.Of(set, "se_about_short_axis_deg"), Se(plane.Eigen.L1), 1e-4);
        Assert.Equal(Answers.Of(set, "se_about_long_axis_deg"), Se(plane.Eigen.L2), 1e-4);
    }

    // Fernandez 2005, J. Struct. Geol. 27, 855-858: M = ln(l1/l3) above 4 and K = ln(l1/l2)/ln(l2/l3) below 0.8 (limits from memory).
    [Theory]
    [InlineData("near_origin")]
    [InlineData("utm_offset")]
    [InlineData("subhorizontal")]
    public void Good_planes_pass_the_limits_for_reliable_fits_and_a_straight_trace_fails(string set)
    {
        Eigen3 e = PlaneFit.To(Set(set)).Eigen;
        Assert.Equal(Answers.Of(set, "M"), Math.Log(e.L1 / e.L3), 1e-4);
        Assert.Equal(Answers.Of(set, "K"), Math.Log(e.L1 / e.L2) / Math.Log(e.L2 / e.L3), 1e-4);
        Assert.True(Math.Log(e.L1 / e.L3) > 4 && Math.Log(e.L1 / e.L2) / Math.Log(e.L2 / e.L3) < 0.8);

        Eigen3 line = PlaneFit.To(Clouds.Patch(new Vec3(), new Vec3(0, 0, 1), 10, 0.05, 200, 3, 0.01)).Eigen;
        Assert.True(Math.Log(line.L1 / line.L2) / Math.Log(line.L2 / line.L3) > 0.8);
    }

    private static Vec3[] Set(string set) =>
    [
        .. Enumerable.Range(0, Points.Count).Where(i => Points.Text(i, "set") == set)
            .Select(i => new Vec3(Points.Number(i, "x"), Points.Number(i, "y"), Points.Number(i, "z"))),
    ];
}
