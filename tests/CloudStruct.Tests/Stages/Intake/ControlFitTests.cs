using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Stages.Intake;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Stages.Intake;

public class ControlFitTests
{
    private static readonly Vec3[] Marks = [new(0, 0, 0), new(40, 5, 8), new(35, 42, 15), new(-4, 38, 6), new(18, 20, 11)];

    [Fact]
    public void A_tilted_turned_and_stretched_model_is_found_out()
    {
        // Turned by 0.5 deg about the vertical (counter-clockwise), tilted by 0.3 deg about east, 2000 ppm too large.
        double turn = 0.5 * Math.PI / 180, tilt = 0.3 * Math.PI / 180;
        ControlPoint[] points = [.. Marks.Select((p, i) => new ControlPoint($"P{i}", p, Model(p, turn, tilt, 1.002), 0.005, 0.008, false))];
        ModelReference reference = ControlFit.Estimate(points, new ModelReference(), StageContext.Plain());
        Assert.Equal("control points", reference.Source);
        Assert.Equal(ReferenceKind.Control, reference.Kind);
        Assert.Equal(0.5, reference.AzimuthSigmaDeg, 0.02);
        Assert.Equal(0.3 / Math.Sqrt(2), reference.TiltSigmaDeg, 0.02);   // rms over both horizontal axes
        Assert.Equal(0.002, reference.ScaleSigma, 0.0002);
    }

    [Fact]
    public void A_perfect_fit_still_owes_the_error_of_the_marks()
    {
        ControlPoint[] points = [.. Marks.Select((p, i) => new ControlPoint($"P{i}", p, p, 0.01, 0.01, true))];
        ModelReference reference = ControlFit.Estimate(points, new ModelReference(), StageContext.Plain());
        Assert.InRange(reference.AzimuthSigmaDeg, 0.005, 0.03);
        Assert.InRange(reference.TiltSigmaDeg, 0.005, 0.05);
    }

    [Fact]
    public void Two_points_or_a_line_of_points_say_nothing_and_survey_yaml_wins()
    {
        var stated = new ModelReference { Kind = ReferenceKind.Rtk, TiltSigmaDeg = 0.07, Source = "survey.yaml" };
        ControlPoint[] line = [.. Enumerable.Range(0, 5).Select(i => new ControlPoint($"L{i}", new Vec3(10 * i, 0, 0), new Vec3((10 * i) + 0.01, 0, 0), 0.01, 0.01, false))];
        Assert.Equal(stated, ControlFit.Estimate(line, stated, StageContext.Plain()));
        ControlPoint[] points = [.. Marks.Select((p, i) => new ControlPoint($"P{i}", p, p, 0.01, 0.01, true))];
        Assert.Equal(stated, ControlFit.Estimate(points[..2], stated, StageContext.Plain()));
        Assert.Equal(stated, ControlFit.Estimate(points, stated, StageContext.Plain()));
    }

    [Fact]
    public void A_mark_without_model_coordinates_gets_its_distance_along_the_normal()
    {
        Vec3 normal = new Vec3(0.6, 0, 0.8);
        SurveyInput survey = Clouds.Survey(new MemorySource(Clouds.Patch(new Vec3(100, 50, 20), normal, 10, 10, 40_000, 2, 0.003))) with
        {
            Control =
            [
                new ControlPoint("above", new Vec3(100, 50, 20) + (normal * 0.06), null, 0.01, 0.01, true),
                new ControlPoint("far", new Vec3(100, 50, 60), null, 0.01, 0.01, true),
                new ControlPoint("picked", new Vec3(1, 2, 3), new Vec3(1.01, 1.98, 3.03), 0.01, 0.01, false),
            ],
        };
        ControlResidual[] residuals = Clouds.Intake(survey).Record.Control;
        Assert.Equal(0.06, residuals[0].AlongNormalM!.Value, 0.003);
        Assert.Null(residuals[1].AlongNormalM);
        Assert.Equal(0.01, residuals[2].DxM!.Value, 1e-9);
        Assert.Equal(0.03, residuals[2].DzM!.Value, 1e-9);
        Assert.Equal("control", residuals[2].Role);
    }

    private static Vec3 Model(Vec3 p, double turn, double tilt, double scale)
    {
        var turned = new Vec3((p.X * Math.Cos(turn)) - (p.Y * Math.Sin(turn)), (p.X * Math.Sin(turn)) + (p.Y * Math.Cos(turn)), p.Z);
        return new Vec3(turned.X, (turned.Y * Math.Cos(tilt)) - (turned.Z * Math.Sin(tilt)), (turned.Y * Math.Sin(tilt)) + (turned.Z * Math.Cos(tilt))) * scale;
    }
}
