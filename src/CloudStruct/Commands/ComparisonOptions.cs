using System.CommandLine;
using System.Text.Encodings.Web;
using System.Text.Json;
using System.Text.Json.Nodes;
using CloudStruct.Formats;
using CloudStruct.Products;
using CloudStruct.Products.Comparing;
using CloudStruct.Records.Comparing;
using CloudStruct.Runs;

namespace CloudStruct.Commands;

/// <summary>What repeat and fieldcheck share: where the table and the figure go, and what is printed.</summary>
internal sealed class ComparisonOptions
{
    private static readonly JsonSerializerOptions Layout = new() { WriteIndented = true, NewLine = "\n", Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping };

    private readonly Option<string?> folder = new("--out") { Description = "Folder for table and figure (default: the first results)" };
    private readonly Option<bool> json = new("--json") { Description = "Print as JSON" };

    /// <summary>Adds the options.</summary>
    public void AddTo(Command command)
    {
        command.Options.Add(folder);
        command.Options.Add(json);
    }

    /// <summary>Writes and prints.</summary>
    public int Finish(ParseResult parsed, TextWriter output, ComparisonRecord record, string runId, string results)
    {
        string place = parsed.GetValue(folder) ?? ResultsReader.PlaceOf(results);
        if (File.Exists(place)) throw new UsageException($"--out {Path.GetFileName(place)}: a file of this name exists. Name a folder.");
        Directory.CreateDirectory(place);
        IReadOnlyList<string> files = ComparisonWriter.Write(place, record, new RunFacts { ToolVersion = Fingerprint.Version, RunId = runId });
        if (parsed.GetValue(json)) output.WriteLine(Json(record).ToJsonString(Layout));
        else
        {
            output.WriteLine(record.Title);
            foreach (string sentence in record.Sentences) output.WriteLine(sentence);
            foreach (string file in files) output.WriteLine(Path.GetRelativePath(Directory.GetCurrentDirectory(), Path.Combine(place, file)));
        }

        return ExitCode.Done;
    }

    private static JsonObject Json(ComparisonRecord r) => new()
    {
        ["pairs"] = r.Pairs.Count(p => p.Counts),
        ["groups"] = new JsonArray([.. r.Groups.Select(g => new JsonObject
        {
            ["name"] = g.Name, ["pairs"] = g.Pairs, ["share95"] = g.Share95, ["share_low95"] = g.ShareLow95, ["share_high95"] = g.ShareHigh95, ["real_over_stated_spread"] = g.Spread,
        })]),
        ["rotation"] = r.Rotation is not { } t ? null : new JsonObject
        {
            ["azimuth_deg"] = t.AzimuthDeg, ["azimuth_low95_deg"] = t.AzimuthLow95Deg, ["azimuth_high95_deg"] = t.AzimuthHigh95Deg,
            ["tilt_deg"] = t.TiltDeg, ["tilt_low95_deg"] = t.TiltLow95Deg, ["tilt_high95_deg"] = t.TiltHigh95Deg, ["tilt_toward_deg"] = t.TiltTowardDeg,
        },
        ["shift_m"] = r.ShiftM is { } s ? new JsonArray(s.X, s.Y, s.Z) : null,
        ["common_means"] = new JsonArray([.. r.Means.Select(m => new JsonObject { ["group"] = m.Group, ["pairs"] = m.Pairs, ["angle_deg"] = m.AngleDeg, ["critical_deg"] = m.CriticalDeg, ["p"] = m.P })]),
        ["sentences"] = new JsonArray([.. r.Sentences.Select(x => (JsonNode)x)]),
    };
}
