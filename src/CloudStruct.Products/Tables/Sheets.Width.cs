using CloudStruct.Records.Frame;
using CloudStruct.Records.Width;

namespace CloudStruct.Products.Tables;

public static partial class Sheets
{
    private static TableSheet<(Station S, Vec3 Map)> Width() => new TableSheet<(Station S, Vec3 Map)>
    {
        File = "width.csv",
        Title = "Width along strike",
        Meaning = "One row for each station on the centre line of a dike. No row at all: no dike was found.",
        From = f => f.Width.Stations.Select(s => (s, f.Intake.Frame.ToMap(s.Place))),
    }
    .Count("dike", "Number of the dike.", r => r.S.Dike)
    .Count("station", "1, 2, ... along the dike.", r => r.S.Number)
    .Metres("chainage_m", "Metres along the dike's centre line.", r => r.S.ChainageM)
    .Metres("x_m", "Place on the centre line, map x (east).", r => r.Map.X)
    .Metres("y_m", "Place on the centre line, map y (north).", r => r.Map.Y)
    .Metres("z_m", "Place on the centre line, height.", r => r.Map.Z)
    .Azimuth("strike_deg", "Strike of the dike there; empty where nothing fixes it.", r => r.S.Attitude?.StrikeDeg)
    .Angle("dip_deg", "Dip of the dike there; empty where nothing fixes it.", r => r.S.Attitude?.DipDeg)
    .Metres("apparent_width_m", "Horizontal distance of the margins across strike.", r => r.S.ApparentWidthM)
    .Metres("true_width_m", "Distance of the margins along the dike's normal.", r => r.S.TrueWidthM)
    .Metres("true_width_low95_m", "Lower 95 % limit of the true width, internal errors.", r => r.S.TrueWidthLow95M)
    .Metres("true_width_high95_m", "Upper 95 % limit of the true width, internal errors.", r => r.S.TrueWidthHigh95M)
    .Word("status", "measured: both margins seen and the dip known. a_hidden, b_hidden, both_hidden: which margin is out of sight. unconstrained: both seen, but nothing fixes the dip.", r => r.S.Status)
    .Metres("visible_width_m", "What is seen of the width where a margin is hidden: a lower bound.", r => r.S.VisibleWidthM)
    .Metres("exposed_width_m", "Width along the ground, square to the trace: an upper bound of the true width.", r => r.S.ExposedWidthM)
    .Angle("trend_along_deg", "Azimuth of the strike in the sense of increasing chainage; it never jumps by 180 deg between neighbours.", r => r.S.TrendAlongDeg)
    .Angle("lean_to_b_deg", "Tilt from vertical, positive when the top leans toward B.", r => r.S.LeanToBDeg)
    .Metres("true_width_total_low95_m", "Lower 95 % limit of the true width with the common errors (scale of the model) added.", r => r.S.TrueWidthTotalLow95M)
    .Metres("true_width_total_high95_m", "Upper 95 % limit of the true width with the common errors added.", r => r.S.TrueWidthTotalHigh95M);
}
