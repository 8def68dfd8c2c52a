using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;
using CloudStruct.Stages.Contacts;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Stages.Contacts;

// Points and answers: testdata/reference/contacts.md (numpy; truth 312/81, width 2.4 m).
public class ParallelPlanesTests
{
    private static readonly ReferenceTable Points = ReferenceTable.Read("reference/contact_points.csv");
    private static readonly ReferenceTable Answers = ReferenceTable.Read("reference/contact_answers.csv");

    private static List<Vec3> Of(string margin, string? face = null) =>
        [.. Enumerable.Range(0, Points.Count).Where(i => Points.Text(i, "margin") == margin && (face is null || Points.Text(i, "face") == face))
            .Select(i => new Vec3(Points.Number(i, "x"), Points.Number(i, "y"), Points.Number(i, "z")))];

    // Names of the cases hold commas, so rows go by their number.
    private static double Answer(int row, string column)
    {
        string[] cells = File.ReadAllLines(Repo.Path("testdata/reference/contact_answers.csv"))[row + 1].Split('"')[^1].TrimStart(',').Split(',');
        string[] header = File.ReadAllLines(Repo.Path("testdata/reference/contact_answers.csv"))[0].Split(',');
        int offset = header.Length - cells.Length;
        return double.Parse(cells[Array.IndexOf(header, column) - offset], System.Globalization.CultureInfo.InvariantCulture);
    }

    [Fact]
    public void One_margin_on_floor_and_wall_gives_312_150_and_81_321()
    {
        Attitude a = Attitude.FromNormal(ParallelPlanes.To(Of("A"), []).Normal);
        Assert.Equal(Answer(1, "dip_direction"), a.DipDirectionDeg, 1e-6);
        Assert.Equal(Answer(1, "dip"), a.DipDeg, 1e-6);
        Assert.Equal(312.150, a.DipDirectionDeg, 0.0005);
        Assert.Equal(81.321, a.DipDeg, 0.0005);
    }

    [Fact]
    public void Both_margins_with_one_normal_give_312_101_and_81_314_and_a_width_of_2_39871()
    {
        ParallelPlanes fit = ParallelPlanes.To(Of("A"), Of("B"));
        Attitude a = Attitude.FromNormal(fit.Normal);
        Assert.Equal(Answer(2, "dip_direction"), a.DipDirectionDeg, 1e-6);
        Assert.Equal(Answer(2, "dip"), a.DipDeg, 1e-6);
        Assert.Equal(2.39871, Math.Abs(fit.WidthM), 0.000005);
        Assert.Equal(Answer(2, "scatter2"), fit.Eigen.L2 * 80, 1e-6);
    }

    [Fact]
    public void One_trace_on_one_planar_face_fits_to_centimetres_errs_by_17_degrees_and_fails_the_gate_of_relief()
    {
        List<Vec3> floor = Of("A", "floor");
        ParallelPlanes fit = ParallelPlanes.To(floor, []);
        Vec3 truth = new Attitude(312 - 90, 81).UpwardNormal();
        double error = Math.Acos(Math.Abs(truth.Dot(fit.Normal))) * 180 / Math.PI;
        Assert.Equal(Answer(0, "error_to_truth_deg"), error, 1e-6);
        Assert.True(Math.Sqrt(fit.Eigen.L3) < 0.03);
        Assert.True(Math.Sqrt(fit.Eigen.L2) < new ContactSettings().ReliefFactor * 0.015);
    }

    // The same points through the fit with correlated noise: its dip must agree with the pooled least squares within the
    // standard error that the reference states, and the single trace must leave the dip open by many degrees.
    [Fact]
    public void Correlated_fit_agrees_with_the_reference_on_both_margins_and_leaves_one_trace_open()
    {
        Vec3 normal = new Attitude(312 - 90, 81).UpwardNormal();
        Sheet sheet = Sheet.Through([new SheetPiece(new Vec3(4, 4, 0), normal, 2.4, 1)], null, 0, new Vec3(1, 0, 0));
        Margin[] sides = sheet.Of(Of("A")[0]).Q < sheet.Of(Of("B")[0]).Q ? [Margin.A, Margin.B] : [Margin.B, Margin.A];
        TraceCell[] Cells(string margin, string? face) =>
            [.. Of(margin, face).Select(p => new TraceCell(margin == "A" ? sides[0] : sides[1], p, sheet.Of(p), 1))];
        var laws = new TraceLaws([(new TraceNoise(new CorrelatedNoise(0.02, 0.2, 0.9), 0, 0, 1), 1)]);
        TraceCell[] all = [.. Cells("A", null).Concat(Cells("B", null)).OrderBy(c => c.At.S)];
        StretchFit both = Fit(all, laws);
        Attitude a = Attitude.FromNormal(both.Pole(sheet.At(both.S)).Normal);
        Assert.Equal(Answer(2, "dip"), a.DipDeg, 2 * Answer(2, "se_large_deg"));
        Assert.Equal(Answer(2, "dip_direction"), a.DipDirectionDeg, 0.5);
        StretchFit line = Fit(Cells("A", "floor"), laws);
        Assert.True(Math.Atan(Math.Sqrt(line.TiltVariance)) * 180 / Math.PI > 10);
    }

    private static StretchFit Fit(TraceCell[] cells, TraceLaws laws)
    {
        double middle = cells.Average(c => c.At.S);
        PatchSlopes slopes = MarginModel.Of(cells, middle, laws)!.Patch(null, cells.Min(c => c.At.S), cells.Max(c => c.At.S), cells.Min(c => c.At.T), cells.Max(c => c.At.T));
        return StretchFit.Of(middle, slopes, cells, Vec3.Up);
    }
}
