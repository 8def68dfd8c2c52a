using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;

namespace CloudStruct.Products.Tables;

public static partial class Sheets
{
    private static TableSheet<(Contact C, Vec3 Map)> Contacts() => new TableSheet<(Contact C, Vec3 Map)>
    {
        File = "contacts.csv",
        Title = "Contacts along strike",
        Meaning = "One row for each stretch of a margin of a dike. No row at all: no dike was found.",
        From = f => f.Contacts.Contacts.Select(c => (c, f.Intake.Frame.ToMap(c.Middle))),
    }
    .Count("dike", "Number of the dike.", r => r.C.Dike)
    .Word("margin", "Side of the dike. Looking along increasing chainage, A is on the left; where the sheet dips less than 30 deg, A is the lower side.", r => r.C.Margin)
    .Count("segment", "1, 2, ... along the margin.", r => r.C.Segment)
    .Metres("chainage_from_m", "Start of the stretch along the dike's centre line.", r => r.C.ChainageFromM)
    .Metres("chainage_to_m", "End of the stretch along the dike's centre line.", r => r.C.ChainageToM)
    .Metres("x_m", "Middle of the evidence, map x (east).", r => r.Map.X)
    .Metres("y_m", "Middle of the evidence, map y (north).", r => r.Map.Y)
    .Metres("z_m", "Middle of the evidence, height.", r => r.Map.Z)
    .Azimuth("strike_deg", "Strike by the right-hand rule; empty where only a line is known.", r => r.C.Constraint == Constraint.Plane ? r.C.Attitude?.StrikeDeg : null)
    .Angle("dip_deg", "Dip; empty where only a line is known.", r => r.C.Constraint == Constraint.Plane ? r.C.Attitude?.DipDeg : null)
    .Azimuth("dip_direction_deg", "Azimuth of steepest descent; empty where only a line is known.", r => r.C.Constraint == Constraint.Plane ? r.C.Attitude?.DipDirectionDeg : null)
    .Angle("cone95_deg", "Half-angle of the cone that holds the true pole with 95 % probability, internal errors only; empty where only a line is known.",
        r => r.C.Constraint == Constraint.Plane ? r.C.Region?.Cone95Deg : null)
    .Metres("relief_m", "How far the evidence departs from a straight line: too little of it and no dip can be told.", r => r.C.ReliefM)
    .Word("constraint", "plane: the evidence fixes strike and dip. line: only a direction.", r => r.C.Constraint)
    .Metres("rms_m", "Root mean square distance of the evidence from the plane, or from the line.", r => r.C.RmsM)
    .Count("points", "Points of the trace or of the contact surface that were used.", r => r.C.Points)
    .Angle("trend_along_deg", "Azimuth of the contact's strike in the sense of increasing chainage; it never jumps by 180 deg between neighbours.", r => r.C.TrendAlongDeg)
    .Angle("lean_to_b_deg", "Tilt from vertical, positive when the top leans toward B.", r => r.C.LeanToBDeg)
    .Angle("lean_low95_deg", "Lower 95 % limit of the lean.", r => r.C.LeanLow95Deg)
    .Angle("lean_high95_deg", "Upper 95 % limit of the lean.", r => r.C.LeanHigh95Deg)
    .Angle("cone95_total_deg", "The cone with the common errors of the whole model added; empty where only a line is known.",
        r => r.C.Constraint == Constraint.Plane ? r.C.Region?.Cone95TotalDeg : null)
    .Angle("ellipse95_major_deg", "Larger half-axis of the 95 % ellipse of the pole, internal errors.", r => r.C.Constraint == Constraint.Plane ? r.C.Region?.Ellipse95MajorDeg : null)
    .Angle("ellipse95_minor_deg", "Smaller half-axis of the 95 % ellipse of the pole, internal errors.", r => r.C.Constraint == Constraint.Plane ? r.C.Region?.Ellipse95MinorDeg : null)
    .Axis("ellipse95_rake_deg", "Rake of the direction in the plane toward which the pole is least certain.", r => r.C.Constraint == Constraint.Plane ? r.C.Region?.Ellipse95RakeDeg : null)
    .Azimuth("line_trend_deg", "Trend of the trace.", r => r.C.LineTrendDeg)
    .Angle("line_plunge_deg", "Plunge of the trace.", r => r.C.LinePlungeDeg)
    .Word("evidence", "What the attitude rests on: the contact surface itself, the trace of one margin over relief, both margins with one normal, or also a prior from field readings.", r => r.C.Evidence)
    .Text("margin_facing", "Compass point that this side of the dike faces: N, NE, ...", r => r.C.MarginFacing)
    .Metres("window_m", "Length of the window along strike in which the evidence was gathered.", r => r.C.WindowM)
    .Text("decided", "What a geologist decided by hand: confirmed, note; empty when nothing.", r => r.C.Decided);
}
