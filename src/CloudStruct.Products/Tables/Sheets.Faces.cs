using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Faces;

namespace CloudStruct.Products.Tables;

public static partial class Sheets
{
    private static TableSheet<FaceRow> Faces() => new TableSheet<FaceRow>
    {
        File = "faces.csv",
        Title = "Fracture faces",
        Meaning = "One row for each exposed planar piece of rock surface, largest first.",
        From = FaceRow.Of,
    }
    .Count("face_id", "Number of the face, from its place and attitude: it stays when settings change and the face does not. The same number stands in the classified cloud.", r => r.Face.FaceId)
    .Word("domain", "The side of the rock the face is on; margin is an exposed contact surface. Empty where that was not decided.", r => r.Domain, FaceDomain.Unknown)
    .Text("set", "Name of the orientation set (see sets.csv); empty when the face belongs to none.", r => r.Set)
    .Metres("x_m", "Middle of the covered surface, map x (east).", r => r.Map.X)
    .Metres("y_m", "Middle of the covered surface, map y (north).", r => r.Map.Y)
    .Metres("z_m", "Middle of the covered surface, height.", r => r.Map.Z)
    .Azimuth("strike_deg", "Strike by the right-hand rule: dip direction minus 90. Means little below 5 deg of dip.", r => r.Face.Attitude.StrikeDeg)
    .Angle("dip_deg", "Dip, 0 level to 90 vertical.", r => r.Face.Attitude.DipDeg)
    .Azimuth("dip_direction_deg", "Azimuth of steepest descent.", r => r.Face.Attitude.DipDirectionDeg)
    .Azimuth("pole_trend_deg", "Trend of the lower-hemisphere normal.", r => r.Face.Attitude.PoleTrendDeg)
    .Angle("pole_plunge_deg", "Plunge of the lower-hemisphere normal.", r => r.Face.Attitude.PolePlungeDeg)
    .Angle("cone95_deg", "Half-angle of the cone about the pole that holds the true pole with 95 % probability, internal errors only.", r => r.Face.Region.Cone95Deg)
    .Number("area_m2", "Area of the covered surface (not of a box around it).", r => r.Face.AreaM2)
    .Metres("length_m", "Extent along strike.", r => r.Face.LengthM)
    .Metres("height_m", "Extent along dip.", r => r.Face.HeightM)
    .Metres("rms_m", "Root mean square distance of the points from the plane.", r => r.Face.RmsM)
    .Count("points", "Points of the working cloud on the face.", r => r.Face.Points)
    .Word("grade", "Trust by the total cone: firm up to 2 deg, fair up to 5 deg, weak above.", r => r.Face.Region.Grade)
    .Angle("cone95_total_deg", "The cone with the common errors of the whole model (tilt, azimuth) added.", r => r.Face.Region.Cone95TotalDeg)
    .Angle("ellipse95_major_deg", "Larger half-axis of the 95 % ellipse of the pole, internal errors.", r => r.Face.Region.Ellipse95MajorDeg)
    .Angle("ellipse95_minor_deg", "Smaller half-axis of the 95 % ellipse of the pole, internal errors.", r => r.Face.Region.Ellipse95MinorDeg)
    .Axis("ellipse95_rake_deg", "Rake, from the strike direction, of the direction in the plane toward which the pole is least certain.", r => r.Face.Region.Ellipse95RakeDeg)
    .Metres("noise_m", "White and short-range part of the scatter about the plane: the survey's noise.", r => r.Face.NoiseM)
    .Metres("waviness_m", "Long-range part of the scatter: the shape of the rock, not an error.", r => r.Face.WavinessM)
    .Word("in_place", "Whether the rock is part of the outcrop (yes) or of a loose block (no).", r => r.InPlace)
    .Count("ends_hidden", "How many of the two ends along strike run out of sight: 0, 1 or 2.", r => r.Face.EndsHidden)
    .Text("decided", "What a geologist decided by hand about this face; empty when nothing; domain, set, note, several with a space between.", r => r.Decided);
}
