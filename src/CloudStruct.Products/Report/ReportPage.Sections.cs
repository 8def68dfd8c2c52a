using System.Xml.Linq;
using CloudStruct.Formats.Tables;
using CloudStruct.Products.Plots;
using CloudStruct.Products.Tables;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Decisions;
using CloudStruct.Records.Frame;
using static System.FormattableString;
using static CloudStruct.Products.Report.Html;

namespace CloudStruct.Products.Report;

internal sealed partial class ReportPage
{
    private const int ShortRows = 12, MostDecisions = 200;

    private XElement Dikes() => Section("dikes", "Dikes, contacts and width",
        findings.Width.Dikes.Length == 0 && findings.Contacts.Contacts.Length == 0
            ? El("p", "No dike was found, so there is no contact and no width. The tables contacts.csv, width.csv and dikes.csv hold their headers only.")
            : null,
        El("div", At("class", "columns"), plots.Where(p => p.Name.StartsWith("width-", StringComparison.Ordinal)).Select(Plot)),
        ShortTable("dikes.csv", "dike", "strike_deg", "dip_deg", "cone95_deg", "cone95_total_deg", "trend_deg", "seen_length_m", "hidden_length_m",
            "true_width_mean_m", "true_width_mean_low95_m", "true_width_mean_high95_m"),
        ContactTable(),
        ShortTable("width.csv", "dike", "station", "chainage_m", "true_width_m", "true_width_low95_m", "true_width_high95_m", "status", "visible_width_m"));

    // All windows, not a few: the strip's bars lead to their rows.
    private XElement? ContactTable() => TableOf("contacts.csv", int.MaxValue, (c, i) => RowId(findings.Contacts.Contacts[i].Dike, findings.Contacts.Contacts[i].Margin.ToString(), findings.Contacts.Contacts[i].Segment),
        ["dike", "margin", "segment", "chainage_from_m", "chainage_to_m", "constraint", "strike_deg", "dip_deg", "cone95_deg", "lean_to_b_deg", "relief_m", "evidence"]);

    private static string RowId(int dike, string margin, int segment) => Invariant($"contact-{dike}-{margin}-{segment}");

    private XElement Faces() => Section("faces", "Fracture faces",
        findings.Faces.Faces.Length == 0 ? El("p", "No face was found.") : El("p", At("class", "linked-only"), "All faces stand in the tables above, under Look closer."),
        ShortTable("faces.csv", "face_id", "domain", "set", "strike_deg", "dip_deg", "cone95_deg", "cone95_total_deg", "area_m2", "length_m", "height_m", "grade", "in_place"));

    private XElement SetsAndNets() => Section("sets", "Orientation sets and nets",
        El("div", At("class", "columns"), plots.Where(p => p.Name.StartsWith("net", StringComparison.Ordinal)).Select(Plot)),
        findings.Sets.Sets.Length == 0 ? El("p", "No set was found.") : null,
        ShortTable("sets.csv", "set", "domain", "count", "strike_deg", "dip_deg", "kappa", "cone95_deg", "shape", "strength", "spacing_mean_m", "spacing_low95_m", "spacing_high95_m", "zone"));

    private XElement? Decided()
    {
        DecisionOutcome[] all = findings.Decisions.Outcomes;
        if (all.Length == 0) return null;
        int applied = all.Count(o => o.Applied);
        return Section("decided", "Decided by hand",
            El("p", $"This run read {Say.Count(all.Length, "decision", "decisions")} from decisions.csv and applied {Say.Count(applied)}. What they changed is marked in the column decided of the tables."
                + (applied < all.Length ? " What could not be applied is among the doubts above, with its reason." : "")),
            TableOf("decisions.csv", MostDecisions, null, ["line", "action", "applied", "found", "matched_face_id", "domain", "set", "other_set", "dike", "margin", "note", "decided_by", "decided_on"]));
    }

    private XElement Views()
    {
        DrawnPlot[] views = [.. plots.Where(IsMap), .. plots.Where(p => p.Svg.Length == 0 && !IsMap(p))];
        return Section("views", "Map and views", views.Length == 0 ? El("p", "No view was drawn.") : null, views.Select(Plot));
    }

    private XElement Surface() => Section("classes", "Classes of the surface",
        findings.Classes.UsedColour ? El("p", "Dike and host were told apart by colour and roughness.") : El("p", "Colour took no part in telling dike from host: texture alone spoke."),
        ShortTable("classes.csv", "class", "points", "area_m2", "precision", "recall", "iou"),
        Confusion());

    private XElement? Confusion()
    {
        if (findings.Classes.Check is not { Classes.Length: > 0 } check) return null;
        string Word(RockClass c) => c.ToString().ToLowerInvariant();
        int n = check.Classes.Length;
        return El("div", At("class", "scroll"), El("table",
            El("caption", Invariant($"Check labels (rows) against result (columns), working points; Cohen's kappa {check.Kappa:F3}.")),
            El("thead", El("tr", El("th", At("scope", "col"), "label"), check.Classes.Select(c => El("th", At("scope", "col"), Word(c))))),
            El("tbody", check.Classes.Select((c, row) => El("tr", El("th", At("scope", "row"), Word(c)),
                Enumerable.Range(0, n).Select(col => El("td", Say.Count(check.Counts[(row * n) + col]))))))));
    }

    private XElement Evidence()
    {
        ModelReference m = findings.Intake.Frame.Reference;
        var d = findings.Described;
        string kind = m.Kind switch
        {
            ReferenceKind.Control => "ground control points",
            ReferenceKind.Rtk => "RTK or PPK camera positions",
            ReferenceKind.CameraPositions => "plain camera positions",
            ReferenceKind.ScaledOnly => "a scale bar only",
            ReferenceKind.None => "nothing: angles are in the model's own frame",
            _ => "not stated in survey.yaml",
        };
        return Section("evidence", "How good the evidence is", El("ul",
            El("li", "Limits and cones are calibrated in simulation: two flights of this outcrop have not been compared."),
            El("li", Clean($"The model is tied to the ground by {kind}. ") + (m.Source == "not stated"
                ? "Its common errors (tilt, azimuth, scale) are not known; columns with \"total\" hold internal errors only, like the others."
                : Clean(Invariant($"Common errors, one sigma: tilt {m.TiltSigmaDeg:0.###}°, azimuth {m.AzimuthSigmaDeg:0.###}°, scale {m.ScaleSigma * 100:0.####} % (from {m.Source}). They do not shrink by averaging. Columns with \"total\" in their name add them; the others hold internal errors.")))),
            findings.Intake.InputSpacingM > 0 ? El("li", Invariant($"Density: points lie {findings.Intake.InputSpacingM * 1000:0.#} mm apart in the files; {d.Cloud.StrayPoints:N0} stray points were dropped.")) : null,
            Hidden(),
            Reliability(),
            d.Cloud.Count == 0 ? null : El("li", Invariant($"Noise of the cloud about smooth rock: {d.NoiseM * 1000:0.#} mm. Normals within {d.NormalRadiusM:0.###} m, roughness within {d.RoughnessRadiusM:0.###} m.")),
            findings.Faces.Faces.Length == 0 ? null : El("li", Invariant($"Faces are planes within {findings.Faces.ToleranceM * 1000:0.#} mm; their noise is {findings.Faces.NoiseM * 1000:0.#} mm, correlated over {findings.Faces.NoiseLengthM:0.###} m.")),
            findings.Classes.Dikes.Select(b => El("li", Invariant($"Dike {b.Dike}: inside and outside differ by {(b.ByColour ? "colour" : "texture alone")} with a separation of {b.Separation:F2} (0.5 none, 1 perfect); its margins scatter by {b.MarginWanderM:0.###} m about the slab."))),
            findings.Classes.ThinnestDikeM > 0 ? El("li", Invariant($"A dike thinner than {findings.Classes.ThinnestDikeM:F2} m may have been missed.")) : null),
            findings.Intake.Control.Length == 0 ? null : ShortTable("checkpoints.csv", "id", "role", "dx_m", "dy_m", "dz_m", "along_normal_m"));
    }

    private XElement? Hidden()
    {
        double seen = findings.Width.Dikes.Sum(k => k.SeenLengthM), hidden = findings.Width.Dikes.Sum(k => k.HiddenLengthM);
        return seen + hidden > 0
            ? El("li", Invariant($"Hidden: a margin cannot be seen on {hidden:0.#} of {seen + hidden:0.#} m of dike ({100 * hidden / (seen + hidden):0} %); no width is given there."))
            : null;
    }

    // Against labels where there are any, else how sure the classes are of themselves.
    private XElement? Reliability()
    {
        ClassSummary[] judged = [.. findings.Classes.Summary.Where(c => c.Iou is { } iou && double.IsFinite(iou))];
        if (judged.Length > 0)
            return El("li", "Classes against the check labels (overlap over union): " + string.Join(", ", judged.Select(c => Invariant($"{c.Class.ToString().ToLowerInvariant()} {c.Iou:F2}"))) + ".");
        byte[] odds = findings.Classes.DikeProbability;
        if (findings.Classes.Dikes.Length == 0 || odds.Length == 0) return null;
        double unsure = odds.Count(p => p is > 51 and < 204) / (double)odds.Length;
        return El("li", Invariant($"Classes: no check labels tell how good they are. On {100 * unsure:0.#} % of the points host and dike are both at least one in five likely."));
    }

    private XElement Run() => Section("run", "This run",
        El("dl", At("class", "facts"),
            Fact("Run", facts.RunId), Fact("Seed", Invariant($"{facts.Seed}")), Fact("Recipe", facts.RecipeName),
            Fact("Licence of the data", facts.Licence.Length > 0 ? facts.Licence : "not stated"),
            Fact("How to cite", facts.Citation.Length > 0 ? facts.Citation : "not stated"),
            facts.Versions.Select(v => Fact(v.Name, v.Value))),
        facts.Inputs.Length == 0 ? null : El("div", At("class", "scroll"), El("table",
            El("caption", "Files read"),
            El("thead", El("tr", new[] { "file", "bytes", "SHA-256" }.Select(h => El("th", At("scope", "col"), h)))),
            El("tbody", facts.Inputs.Select(f => El("tr", El("th", At("scope", "row"), Clean(f.Name)), El("td", Say.Count(f.Bytes)), El("td", El("code", f.Sha256))))))),
        El("details", El("summary", "The recipe in full"), El("pre", Clean(facts.Recipe))),
        El("p", "Everything here stands in ", Link("run.json", "run.json"), " too, from which the run repeats exactly. What each table column means: ",
            Link("tables/tables-metadata.json", "tables-metadata.json"), "."));

    private static object[] Fact(string name, string value) => [El("dt", Clean(name)), El("dd", Clean(value))];

    private static XElement Cautions() => El("section", At("id", "cautions"), At("aria-labelledby", "cautions-title"),
        El("h2", At("id", "cautions-title"), "Cautions"),
        El("p", "Measurements from a model do not replace inspection by a competent person. Steep and broken ground can fall. Permissions for drones, sites, heritage and drilling are a matter of local law. Nothing here is a stability assessment or an engineering design: for those, local codes and a licensed practitioner decide."));

    private XElement? ShortTable(string file, params string[] columns) => TableOf(file, ShortRows, null, columns);

    private XElement? TableOf(string file, int most, Func<string[], int, string>? id, string[] columns)
    {
        ITableSheet table = Sheets.All.Single(t => t.File == file);
        if (!table.Applies(findings)) return null;
        CsvSheet sheet = table.Fill(findings);
        if (sheet.Count == 0) return null;
        int[] at = [.. columns.Select(c => sheet.Columns.Select(k => k.Name).ToList().IndexOf(c))];
        // A column without a single value says nothing on a page; in the file it stays.
        at = [.. at.Where(k => sheet.Rows.Any(r => r[k].Length > 0))];
        bool cut = sheet.Count > most;
        // The linked page shows these with all rows and columns.
        string plain = file is "faces.csv" or "width.csv" or "contacts.csv" or "sets.csv" or "decisions.csv" ? " plain" : "";
        return El("div", At("class", "scroll" + plain), At("tabindex", "0"), At("role", "region"), At("aria-label", table.Title), El("table",
            El("caption", table.Title + (cut ? Invariant($", the first {most} of {Say.Count(sheet.Count)} rows") : "") + ": ", Link("tables/" + file, file)),
            El("thead", El("tr", at.Select(k => El("th", At("scope", "col"), sheet.Columns[k].Kind == CsvKind.Text ? At("class", "word") : null, At("title", sheet.Columns[k].Description), Breakable(sheet.Columns[k].Name))))),
            El("tbody", sheet.Rows.Take(most).Select((row, i) => El("tr", id == null ? null : At("id", id(row, i)), at.Select((k, j) => j == 0
                ? El("th", At("scope", "row"), Clean(row[k]))
                : El("td", sheet.Columns[k].Kind == CsvKind.Text ? At("class", "word") : null, Clean(row[k])))))) ));
    }

    // A long column name may break after each underscore, without a character that copying would take along.
    private static IEnumerable<object> Breakable(string name) =>
        name.Split('_').SelectMany((part, i) => i == 0 ? new object[] { part } : ["_", El("wbr"), part]);
}
