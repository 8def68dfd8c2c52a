using System.Globalization;
using System.Text;
using System.Text.Encodings.Web;
using System.Text.Json;
using System.Text.Json.Nodes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Sets;
using CloudStruct.Records.Width;
using CloudStruct.Runs;
using static System.FormattableString;

namespace CloudStruct.Commands;

/// <summary>What was found, in about ten lines for people or as JSON for scripts.</summary>
internal static class RunSummary
{
    private static readonly JsonSerializerOptions Layout = new() { WriteIndented = true, NewLine = "\n", Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping };

    // More would push what matters off the screen.
    private const int MostDikes = 2;

    private static readonly string[] Folders = ["tables", "plots", "map", "model", "clouds"];

    /// <summary>About ten lines.</summary>
    public static string Text(MeasureOutcome o)
    {
        Findings f = o.Findings;
        SurveyFrame frame = f.Intake.Frame;
        var text = new StringBuilder();
        Line(Invariant($"{f.SurveyName}: {f.Intake.Points:N0} points kept, {f.Described.Cloud.Count:N0} working points at {f.Described.Cloud.SpacingM * 100:0.0} cm; azimuths from ") + (frame.North switch
        {
            North.True => Invariant($"true north (convergence {frame.ConvergenceDeg ?? 0:+0.00;-0.00} deg applied)"),
            North.Grid => "grid north",
            _ => "the model's y axis: nothing ties this model to the ground",
        }));
        Line(Invariant($"Faces: {f.Faces.Faces.Length:N0} of {f.Faces.SmallestFaceM2:0.###} m2 or more, {f.Faces.Faces.Sum(x => x.AreaM2):N0} m2 in all"));
        if (f.Contacts.Dikes.Length == 0)
        {
            Line(f.Classes.ThinnestDikeM > 0
                ? Invariant($"No dike was found; one thinner than {f.Classes.ThinnestDikeM:0.##} m would have been missed")
                : "No dike was looked for");
        }

        foreach (DikeSummary d in f.Width.Dikes.Take(MostDikes)) Line(OfDike(d, f.Contacts));
        if (f.Width.Dikes.Length > MostDikes) Line(Invariant($"{f.Width.Dikes.Length - MostDikes} more dikes stand in tables/dikes.csv"));
        foreach (IGrouping<FaceDomain, OrientationSet> domain in f.Sets.Sets.GroupBy(s => s.Domain))
        {
            Line("Sets: " + string.Join("; ", domain.Take(6).Select(s =>
                Invariant($"{s.Set} {s.Mean.StrikeDeg:000}/{s.Mean.DipDeg:00} ±{s.Cone95Deg:0.0} deg (n {s.Count})"))) + (domain.Count() > 6 ? "; ..." : ""));
        }

        int doubtful = f.Remarks.Count(r => r.Doubtful);
        if (doubtful > 0) Line(Invariant($"Doubtful: {doubtful} remark{(doubtful == 1 ? "" : "s")}, first: {f.Remarks.First(r => r.Doubtful).Text}"));
        foreach (string l in o.LeftOut) Line($"LEFT OUT: {l}");
        Line(Invariant($"Run {o.RunId}: {o.Times.Sum(t => t.Seconds):0.0} s, peak memory {o.PeakGib:0.00} GiB"));
        Line(Invariant($"Report: {Shown(o, "report.html")}; {string.Join(", ", Folders.Where(n => o.Files.Any(x => x.StartsWith(n + "/", StringComparison.Ordinal))))} in {Shown(o, "")}"));
        Line(Cautions.Sentences[0] + " Steep and broken ground can fall.");
        return text.ToString();

        void Line(string s) => text.Append(s).Append('\n');
    }

    /// <summary>The same for scripts.</summary>
    public static string Json(MeasureOutcome o)
    {
        Findings f = o.Findings;
        return new JsonObject
        {
            ["run_id"] = o.RunId,
            ["exit_code"] = o.ExitCode,
            ["results"] = Shown(o, ""),
            ["report"] = Shown(o, "report.html"),
            ["tables"] = Shown(o, "tables"),
            ["map"] = Shown(o, "map/structures.gpkg"),
            ["model"] = Shown(o, "model/faces.glb"),
            ["points_kept"] = f.Intake.Points,
            ["working_points"] = f.Described.Cloud.Count,
            ["faces"] = f.Faces.Faces.Length,
            ["contacts"] = f.Contacts.Contacts.Length,
            ["dikes"] = new JsonArray([.. f.Width.Dikes.Select(d => new JsonObject
            {
                ["dike"] = d.Dike,
                ["strike_deg"] = Round(d.Mean?.StrikeDeg, 2),
                ["dip_deg"] = Round(d.Mean?.DipDeg, 2),
                ["cone95_total_deg"] = Round(d.Region?.Cone95TotalDeg, 2),
                ["true_width_mean_m"] = Round(d.WidthMeanM?.Value, 3),
                ["true_width_mean_low95_m"] = Round(d.WidthMeanM?.Low95, 3),
                ["true_width_mean_high95_m"] = Round(d.WidthMeanM?.High95, 3),
                ["seen_length_m"] = Round(d.SeenLengthM, 3),
                ["hidden_length_m"] = Round(d.HiddenLengthM, 3),
            })]),
            ["thinnest_dike_m"] = Round(f.Classes.ThinnestDikeM, 3),
            ["sets"] = f.Sets.Sets.Length,
            ["doubtful"] = new JsonArray([.. f.Remarks.Where(r => r.Doubtful).Select(r => (JsonNode)r.Text)]),
            ["left_out"] = new JsonArray([.. o.LeftOut.Select(l => (JsonNode)l)]),
            ["seconds"] = Math.Round(o.Times.Sum(t => t.Seconds), 3),
            ["peak_memory_gib"] = Math.Round(o.PeakGib, 3),
        }.ToJsonString(Layout) + "\n";
    }

    /// <summary>Time per stage.</summary>
    public static string Profile(MeasureOutcome o)
    {
        double total = Math.Max(1e-9, o.Times.Sum(t => t.Seconds));
        var text = new StringBuilder();
        foreach (StageTime t in o.Times)
        {
            text.Append(Invariant($"{t.Stage,-10} {t.Seconds,8:0.00} s {100 * t.Seconds / total,5:0.0} %{(t.Cached ? "  from the store" : "")}")).Append('\n');
        }

        return text.Append(Invariant($"{"all",-10} {total,8:0.00} s, {o.Findings.Intake.Points / total / 1e6:0.00} M points/s, peak memory {o.PeakGib:0.00} GiB")).Append('\n').ToString();
    }

    private static string OfDike(DikeSummary d, ContactsRecord contacts)
    {
        string attitude = d is { Mean: { } m, Region: { } r }
            ? Invariant($"{m.StrikeDeg:000}/{m.DipDeg:00} ±{r.Cone95TotalDeg:0.0} deg")
            : Invariant($"trend {d.TrendDeg:000}, dip not fixed by the rock seen");
        string width = d.WidthMeanM is { } w
            ? Invariant($"true width {w.Value:0.00} m ({w.Low95:0.00} to {w.High95:0.00}), {d.WidthMinM!.Value:0.00} to {d.WidthMaxM!.Value:0.00} along strike")
            : "true width not measured";
        return Invariant($"Dike {d.Dike}: {attitude}; {width}; {d.SeenLengthM:0} m seen, {d.HiddenLengthM:0} m hidden, {contacts.Contacts.Count(c => c.Dike == d.Dike)} contact rows");
    }

    private static double? Round(double? value, int digits) => value is { } v && double.IsFinite(v) ? Math.Round(v, digits) : null;

    // The path as the user can type it from where they are; results never hold it.
    private static string Shown(MeasureOutcome o, string inside) =>
        Path.GetRelativePath(Directory.GetCurrentDirectory(), Path.Combine(o.Folder, inside)).ToString(CultureInfo.InvariantCulture);
}
