using CloudStruct.Records.Contacts;
using CloudStruct.Records.Decisions;

namespace CloudStruct.Products.Tables;

public static partial class Sheets
{
    private static TableSheet<DecisionOutcome> Decisions() => new TableSheet<DecisionOutcome>
    {
        File = "decisions.csv",
        Title = "Decisions by hand",
        Meaning = "One row for each row of the survey's decisions.csv, with what became of it. Written only when there is such a file.",
        When = f => f.Decisions.Outcomes.Length > 0,
        From = f => f.Decisions.Outcomes,
    }
    .Count("line", "Line of the survey's decisions.csv.", o => o.Decision.Line)
    .Word("action", "What was decided.", o => o.Decision.Action)
    .Word("applied", "Whether this run could apply it: the face, contact or set was known again by place and attitude.", ["yes", "no"], o => o.Applied ? "yes" : "no")
    .Text("found", "What was done, or why not.", o => o.Found)
    .Count("face_id", "Number that the face had when it was decided on.", o => o.Decision.FaceId == 0 ? null : o.Decision.FaceId)
    .Count("matched_face_id", "Number of the face in this run, dropped ones included.", o => o.FaceId == 0 ? null : o.FaceId)
    .Metres("x_m", "Place of the decision, map x (east).", o => o.Decision.Place?.X)
    .Metres("y_m", "Place of the decision, map y (north).", o => o.Decision.Place?.Y)
    .Metres("z_m", "Place of the decision, height.", o => o.Decision.Place?.Z)
    .Azimuth("strike_deg", "Strike by which it is known again: of the face, the contact, the first set or the first part.", o => o.Decision.Attitude?.StrikeDeg)
    .Angle("dip_deg", "Dip that goes with it.", o => o.Decision.Attitude?.DipDeg)
    .Azimuth("other_strike_deg", "Strike of the second set or part.", o => o.Decision.Other?.StrikeDeg)
    .Angle("other_dip_deg", "Dip that goes with it.", o => o.Decision.Other?.DipDeg)
    .Word("domain", "Domain decided, or of the sets.", o => o.Decision.Domain, FaceDomain.Unknown)
    .Text("set", "Name that the set had.", o => o.Decision.Set)
    .Text("other_set", "Name that the second set had.", o => o.Decision.OtherSet)
    .Count("dike", "Number of the dike.", o => o.Decision.Dike == 0 ? null : o.Decision.Dike)
    .Text("margin", "Side of the dike: A or B.", o => o.Decision.Margin?.ToString() ?? "")
    .Text("note", "Words of the geologist.", o => o.Decision.Note)
    .Text("decided_by", "Who decided, where the row says it.", o => o.Decision.By)
    .Text("decided_on", "Day of the decision, where the row says it.", o => o.Decision.On);
}
