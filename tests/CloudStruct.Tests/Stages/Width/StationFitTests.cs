using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;
using CloudStruct.Stages.Width;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Stages.Width;

public class StationFitTests
{
    // Sixteen traverses across a slope with their true thickness: testdata/reference/contacts.md. The traverse leads from margin
    // to margin; both traces run on from its ends along strike, as on a slope of even grade.
    [Fact]
    public void Traverses_across_a_slope_give_the_true_thickness_of_the_reference()
    {
        ReferenceTable cases = ReferenceTable.Read("reference/true_thickness.csv");
        var frame = new DikeFrame { TraceScatterM = 0.001, TraceRangeM = 0.5, TraceWhiteShare = 0.5 };
        for (int i = 0; i < cases.Count; i++)
        {
            double azimuth = cases.Number(i, "traverse_azimuth") * Math.PI / 180, run = cases.Number(i, "horizontal_distance");
            var across = new Vec3(run * Math.Sin(azimuth), run * Math.Cos(azimuth), cases.Number(i, "rise"));
            Vec3 normal = new Attitude(cases.Number(i, "dip_direction") - 90, cases.Number(i, "dip")).UpwardNormal();
            if (normal.Dot(across) < 0) normal = -normal;
            Vec3 along = Vec3.Up.Cross(normal) is { Length: > 1e-9 } level ? level.Unit() : new Vec3(0, 1, 0), up = normal.Cross(along);
            if (up.Z < 0) up = -up;
            Vec3 offset = along * across.Dot(along);
            TraceVertex[] near = [.. Enumerable.Range(-4, 9).SelectMany(k => (TraceVertex[])
            [
                new(Margin.A, along * (k * 0.3), k), new(Margin.B, across - offset + (along * (k * 0.3)), k),
            ])];
            StationFit? fit = StationFit.Of(near, across / 2, normal, along, up, 0.001, frame);
            double truth = cases.Number(i, "true_thickness");
            Assert.Equal(truth, fit!.WidthM, 1e-6 * Math.Max(1, truth));
        }
    }

    // First-order error of the thickness between two points, agreed by Monte Carlo: testdata/reference/contacts.md. One point on
    // each margin, the height axis laid along the offset within the sheet.
    [Fact]
    public void Error_of_the_width_between_two_points_is_that_of_the_reference()
    {
        ReferenceTable cases = ReferenceTable.Read("reference/thickness_error.csv");
        for (int i = 0; i < cases.Count; i++)
        {
            var across = new Vec3(cases.Number(i, "dx"), cases.Number(i, "dy"), cases.Number(i, "dz"));
            Vec3 normal = new Attitude(cases.Number(i, "dip_direction") - 90, cases.Number(i, "dip")).UpwardNormal();
            if (normal.Dot(across) < 0) normal = -normal;
            Vec3 up = (across - (normal * normal.Dot(across))).Unit(), along = normal.Cross(up);
            double point = cases.Number(i, "sigma_point_m"), dip = cases.Number(i, "sigma_normal_deg_per_axis") * Math.PI / 180;
            var frame = new DikeFrame { TraceScatterM = point, TraceRangeM = 0.5, TraceWhiteShare = 1 };
            StationFit? fit = StationFit.Of(
                [new(Margin.A, default, 0), new(Margin.B, across, 0)], across / 2, normal, along, up, dip, frame);
            Assert.Equal(cases.Number(i, "t"), fit!.WidthM, 1e-6);
            Assert.Equal(cases.Number(i, "sigma_first_order"), fit.SigmaM, 1e-6);
            Assert.Equal(cases.Number(i, "mc_sd"), fit.SigmaM, 0.005 * cases.Number(i, "mc_sd"));   // 200 000 draws
        }
    }
}
