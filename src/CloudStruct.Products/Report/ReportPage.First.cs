using System.Xml.Linq;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Points;
using CloudStruct.Records.Sets;
using CloudStruct.Records.Stages;
using CloudStruct.Records.Width;
using static System.FormattableString;
using static CloudStruct.Products.Report.Html;

namespace CloudStruct.Products.Report;

internal sealed partial class ReportPage
{
    private XElement Measured()
    {
        IntakeRecord intake = findings.Intake;
        WorkingCloud cloud = findings.Described.Cloud;
        return El("p", At("class", "lead"), Clean(
            $"Measured on {Say.Count(intake.Points, "point", "points")} of {Say.Count(intake.Tiles.Length, "file", "files")}, "
            + Invariant($"thinned to {Say.Count(cloud.Count)} points {cloud.SpacingM:0.###} m apart. ")
            + (intake.HasColour ? "" : "The cloud has no colour: texture alone had to tell dike from host. ")
            + $"Coordinate system: {FrameWords.Crs(intake.Frame.Crs)}. {FrameWords.NorthSentence(intake.Frame, facts)}"));
    }

    // Five numbers, the same five places on every report; what there is not is said in its place.
    private XElement Numbers()
    {
        DikeSummary? dike = findings.Width.Dikes.FirstOrDefault();
        string of = findings.Width.Dikes.Length > 1 ? Invariant($" of dike {dike!.Dike}") : "";
        OrientationSet? set = findings.Sets.Sets.Where(s => s.Zone.Length == 0).OrderByDescending(s => s.Count).FirstOrDefault();
        return El("section", At("class", "numbers"), At("aria-label", "The numbers that matter"), El("dl",
            dike == null ? NoDike() :
                dike.WidthMeanM is { } mean ? Number("True width" + of, Invariant($"{mean.Value:F2} m"), Say.Limits(mean).Trim(' ', '(', ')'), Stations(dike))
                : Number("True width" + of, "not determined", "no station shows both margins with a known dip", Stations(dike)),
            dike == null ? null :
                dike.Mean is { } a ? Number("Attitude" + of, Say.Attitude(a), Say.Cone(dike.Region), "mean over the part whose dip is known")
                : Number("Attitude" + of, Invariant($"trend {dike.TrendDeg:000}°"), "a direction only", "the margins are too straight to give a dip"),
            dike == null ? null :
                Number("Length" + of, Invariant($"{dike.SeenLengthM:F1} m"), "both margins seen", Invariant($"{dike.HiddenLengthM:F1} m more between the ends with a margin hidden")),
            FacesNumber(),
            set == null ? Number("Orientation sets", "none", "", "too few faces of like attitude")
                : Number("Largest set, " + set.Set, Say.Attitude(set.Mean),
                    double.IsFinite(set.Cone95Deg) ? Invariant($"95 % cone of the mean {set.Cone95Deg:F1}°") : "95 % cone not determined",
                    Say.Count(set.Count, "face", "faces") + (set.SpacingM is { } s ? ", spacing " + Say.Metres(s) : ""))));
    }

    private XElement NoDike() => Number("Dike", "none found",
        double.IsFinite(findings.Classes.ThinnestDikeM) && findings.Classes.ThinnestDikeM > 0
            ? Invariant($"none thicker than {findings.Classes.ThinnestDikeM:F2} m would have been missed") : "how thin a dike could have been missed is not determined",
        "no contact, width or dike rows in the tables");

    private XElement FacesNumber()
    {
        Face[] faces = findings.Faces.Faces;
        if (faces.Length == 0)
            return Number("Fracture faces", "none", Invariant($"of {findings.Faces.SmallestFaceM2:0.###} m² or more"), "");
        var grades = faces.ToLookup(f => f.Region.Grade);
        return Number("Fracture faces", Say.Count(faces.Length), Invariant($"of {findings.Faces.SmallestFaceM2:0.###} m² or more"),
            $"{Say.Count(grades[Records.Attitudes.Grade.Firm].Count())} firm (cone up to 2°), {Say.Count(grades[Records.Attitudes.Grade.Fair].Count())} fair (up to 5°), {Say.Count(grades[Records.Attitudes.Grade.Weak].Count())} weak");
    }

    private string Stations(DikeSummary dike)
    {
        int all = findings.Width.Stations.Count(s => s.Dike == dike.Dike);
        string worth = dike.NEffective is { } n && double.IsFinite(n) ? Invariant($", worth {n:0.#} independent ones") : "";
        return Invariant($"mean of {dike.Measured} of {all} stations") + worth;
    }

    private static XElement Number(string what, string value, string limits, string note) => El("div",
        El("dt", Clean(what)), El("dd", At("class", "value"), Clean(value)), limits.Length > 0 ? El("dd", At("class", "limits"), Clean(limits)) : null,
        note.Length > 0 ? El("dd", At("class", "note"), Clean(note)) : null);

    private XElement Doubts()
    {
        Remark[] doubtful = [.. findings.Remarks.Where(r => r.Doubtful)], others = [.. findings.Remarks.Where(r => !r.Doubtful)];
        int lines = findings.Contacts.Contacts.Count(c => c.Constraint == Constraint.Line);
        return El("section", At("id", "doubts"), At("class", "doubts"), At("aria-labelledby", "doubts-title"),
            El("h2", At("id", "doubts-title"), "What is doubtful"),
            doubtful.Length == 0 && lines == 0 ? El("p", "No stage called a result doubtful.") : El("ul",
                doubtful.Select(r => Item(r)),
                lines == 0 ? null : El("li", Say.Count(lines, "contact window gives", "contact windows give") + " a direction only: the trace is too straight there for a dip.")),
            others.Length == 0 ? null : El("details", El("summary", Say.Count(others.Length, "other remark", "other remarks")), El("ul", others.Select(r => Item(r)))));
    }

    private static XElement Item(Remark r) => El("li", El("b", Clean(r.Stage) + ": "), Clean(r.Text));
}
