using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Products.Tables;

public static partial class Sheets
{
    private static TableSheet<(ControlResidual P, ModelReference M)> Checkpoints() => new TableSheet<(ControlResidual P, ModelReference M)>
    {
        File = "checkpoints.csv",
        Title = "Control and check points",
        Meaning = "One row for each surveyed point: model minus survey. Tilt, azimuth and scale are those of the whole model and stand in every row. The table is missing when the survey has no such points.",
        From = f => f.Intake.Control.Select(p => (p, f.Intake.Frame.Reference)),
        When = f => f.Intake.Control.Length > 0,
    }
    .Text("id", "Name of the point.", r => r.P.Id)
    .Word("role", "control: used in building the model. check: kept out of it.", ["control", "check"], r => r.P.Role)
    .Metres("dx_m", "Model minus survey, x; empty when the mark was not picked in the model.", r => r.P.DxM)
    .Metres("dy_m", "Model minus survey, y.", r => r.P.DyM)
    .Metres("dz_m", "Model minus survey, height.", r => r.P.DzM)
    .Metres("along_normal_m", "Distance of the surveyed place from the model's surface along its normal; empty when no surface is near.", r => r.P.AlongNormalM)
    .Angle("tilt_sigma_deg", "One-sigma tilt of the model about each horizontal axis.", r => Known(r.M, r.M.TiltSigmaDeg))
    .Angle("azimuth_sigma_deg", "One-sigma turn of the model about the vertical.", r => Known(r.M, r.M.AzimuthSigmaDeg))
    .Number("scale_sigma", "One-sigma relative error of all lengths.", r => Known(r.M, r.M.ScaleSigma));

    // A sigma that nobody stated or estimated is 0 in the record; it must not be read as "exact".
    private static double? Known(ModelReference m, double sigma) => m.Source == "not stated" ? null : sigma;
}
