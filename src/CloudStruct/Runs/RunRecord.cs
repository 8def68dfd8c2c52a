using System.Diagnostics;
using System.Text.Encodings.Web;
using System.Text.Json;
using System.Text.Json.Nodes;
using CloudStruct.Products;
using CloudStruct.Recipes;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Decisions;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Records.Width;

namespace CloudStruct.Runs;

/// <summary>run.json: from it the run repeats exactly. Only the part 'timing' differs between two runs of the same input.</summary>
internal static class RunRecord
{
    /// <summary>Name of the file.</summary>
    public const string FileName = "run.json";

    /// <summary>How we know our own folders.</summary>
    public const string Tool = "CloudStruct";

    private const int FormatVersion = 1;

    private static readonly JsonSerializerOptions Layout = new() { WriteIndented = true, NewLine = "\n", Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping };

    /// <summary>Id of a run: the same for the same version, inputs, settings and seed.</summary>
    public static string IdOf(IEnumerable<InputFile> inputs, JsonObject recipe, ulong seed) => Fingerprint.OfText(
        [Fingerprint.Version, recipe.ToJsonString(), seed.ToString(System.Globalization.CultureInfo.InvariantCulture), .. inputs.Select(i => i.Name + i.Sha256)])[..12];

    /// <summary>Files that a results folder says it wrote, with forward slashes; empty when its record cannot be read.</summary>
    public static HashSet<string> FilesOf(string folder)
    {
        using JsonDocument json = JsonDocument.Parse(File.ReadAllBytes(Path.Combine(folder, FileName)));
        return json.RootElement.TryGetProperty("files", out JsonElement files) && files.ValueKind == JsonValueKind.Array
            ? [.. files.EnumerateArray().Select(f => f.GetString() ?? "")]
            : [];
    }

    /// <summary>Writes run.json.</summary>
    public static void Write(
        string folder, Findings findings, Recipe recipe, string runId, ulong seed, int threads, InputFile[] inputs, string[] leftOut, string[] files, StageTime[] times, double budgetGib, double estimateGib)
    {
        SurveyFrame frame = findings.Intake.Frame;
        var json = new JsonObject
        {
            ["format_version"] = FormatVersion,
            ["tool"] = Tool,
            ["version"] = Fingerprint.Version,
            ["run_id"] = runId,
            ["survey"] = findings.SurveyName,
            ["status"] = leftOut.Length == 0 ? "done" : "done_in_part",
            ["left_out"] = new JsonArray([.. leftOut.Select(l => (JsonNode)l)]),
            ["seed"] = seed,
            ["north"] = Words.Snake(frame.North.ToString()),
            ["convergence_deg"] = frame.ConvergenceDeg,
            ["crs"] = new JsonObject
            {
                ["name"] = frame.Crs.Name,
                ["kind"] = Words.Snake(frame.Crs.Kind.ToString()),
                ["epsg"] = frame.Crs.Epsg == 0 ? null : frame.Crs.Epsg,
                ["source"] = frame.Crs.Source,
                ["vertical"] = frame.Crs.VerticalName,
            },
            ["origin_m"] = new JsonArray(frame.Origin.X, frame.Origin.Y, frame.Origin.Z),
            ["reference"] = Of(frame.Reference),
            ["inputs"] = new JsonArray([.. inputs.Select(i => new JsonObject { ["name"] = i.Name, ["bytes"] = i.Bytes, ["sha256"] = i.Sha256 })]),
            ["tiles"] = new JsonArray([.. findings.Intake.Tiles.Select(Of)]),
            ["counts"] = Counts(findings),
            ["decisions"] = Decided(findings.Decisions),
            ["scales"] = Scales(findings),
            ["classes"] = Judged(findings.Classes),
            ["recipe"] = RecipeJson.Of(recipe),
            ["remarks"] = new JsonArray([.. findings.Remarks.Select(Of)]),
            ["files"] = new JsonArray([.. files.Select(f => (JsonNode)f)]),
            ["cautions"] = new JsonArray([.. Cautions.Sentences.Select(c => (JsonNode)c)]),
            ["timing"] = Timing(times, threads, budgetGib, estimateGib),
        };
        File.WriteAllText(Path.Combine(folder, FileName), json.ToJsonString(Layout) + "\n");
    }

    /// <summary>Peak working set of this process so far [GiB].</summary>
    public static double PeakGib()
    {
        using var self = Process.GetCurrentProcess();
        return self.PeakWorkingSet64 / (double)(1L << 30);
    }

    private static JsonObject Of(ModelReference r) => new()
    {
        ["kind"] = Words.Snake(r.Kind.ToString()),
        ["tilt_sigma_deg"] = r.TiltSigmaDeg,
        ["azimuth_sigma_deg"] = r.AzimuthSigmaDeg,
        ["scale_sigma"] = r.ScaleSigma,
        ["source"] = r.Source,
    };

    private static JsonObject Of(TileFix t) => new()
    {
        ["name"] = t.Name,
        ["points_read"] = t.PointsRead,
        ["not_a_number"] = t.NotANumber,
        ["far_outliers"] = t.FarOutliers,
        ["doubled"] = t.Doubled,
        ["shift_z_m"] = Math.Round(t.ShiftZM, 4),
        ["colour_bits"] = 8 + t.ColourShift,
        ["is_copy"] = t.IsCopy,
    };

    private static JsonObject Of(Remark r) => new() { ["stage"] = r.Stage, ["text"] = r.Text, ["doubtful"] = r.Doubtful };

    private static JsonObject Counts(Findings f) => new()
    {
        ["points_read"] = f.Intake.Tiles.Sum(t => t.PointsRead),
        ["points_kept"] = f.Intake.Points,
        ["stray_points"] = f.Described.Cloud.StrayPoints,
        ["working_points"] = f.Described.Cloud.Count,
        ["faces"] = f.Faces.Faces.Length,
        ["dikes"] = f.Contacts.Dikes.Length,
        ["contacts"] = f.Contacts.Contacts.Length,
        ["stations"] = f.Width.Stations.Length,
        ["stations_measured"] = f.Width.Stations.Count(s => s.Status == StationStatus.Measured),
        ["sets"] = f.Sets.Sets.Length,
    };

    private static JsonObject? Decided(DecisionsRecord decisions) => decisions.Outcomes.Length == 0 ? null : new JsonObject
    {
        ["read"] = decisions.Outcomes.Length,
        ["applied"] = decisions.Outcomes.Count(o => o.Applied),
        ["not_applied"] = decisions.Outcomes.Count(o => !o.Applied),
        ["by_action"] = new JsonObject([.. decisions.Outcomes.Where(o => o.Applied).GroupBy(o => o.Decision.Action).OrderBy(g => g.Key)
            .Select(g => KeyValuePair.Create<string, JsonNode?>(Words.Snake(g.Key.ToString()), g.Count()))]),
    };

    private static JsonObject Scales(Findings f) => new()
    {
        ["input_spacing_m"] = Rounded(f.Intake.InputSpacingM),
        ["spacing_m"] = Rounded(f.Described.Cloud.SpacingM),
        ["noise_m"] = Rounded(f.Faces.NoiseM > 0 ? f.Faces.NoiseM : f.Described.NoiseM),
        ["noise_length_m"] = Rounded(f.Faces.NoiseLengthM),
        ["normal_radius_m"] = Rounded(f.Described.NormalRadiusM),
        ["roughness_radius_m"] = Rounded(f.Described.RoughnessRadiusM),
        ["planarity_radii_m"] = new JsonArray([.. f.Described.PlanarityRadiiM.Select(r => (JsonNode?)Rounded(r))]),
        ["tolerance_m"] = Rounded(f.Faces.ToleranceM),
        ["smallest_face_m2"] = Rounded(f.Faces.SmallestFaceM2),
        ["thinnest_dike_m"] = Rounded(f.Classes.ThinnestDikeM),
    };

    private static JsonObject? Judged(ClassifiedCloud classes) => classes.Check is not { } check ? null : new JsonObject
    {
        ["kappa"] = Rounded(check.Kappa),
        ["classes"] = new JsonArray([.. check.Classes.Select(c => (JsonNode)Words.Snake(c.ToString()))]),
        ["confusion_truth_by_found"] = new JsonArray([.. check.Counts.Select(c => (JsonNode)c)]),
    };

    private static JsonObject Timing(StageTime[] times, int threads, double budgetGib, double estimateGib) => new()
    {
        ["threads"] = threads,
        ["total_s"] = Math.Round(times.Sum(t => t.Seconds), 3),
        ["stages"] = new JsonArray([.. times.Select(t => new JsonObject { ["stage"] = t.Stage, ["seconds"] = Math.Round(t.Seconds, 3), ["from_store"] = t.Cached })]),
        ["memory_budget_gib"] = Math.Round(budgetGib, 2),
        ["memory_estimate_gib"] = Math.Round(estimateGib, 2),
        ["memory_peak_gib"] = Math.Round(PeakGib(), 3),
    };

    private static double? Rounded(double value) => double.IsFinite(value) ? Math.Round(value, 5) : null;
}
