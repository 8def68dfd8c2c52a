using System.CommandLine;
using System.Text.Encodings.Web;
using System.Text.Json;
using System.Text.Json.Nodes;
using CloudStruct.Formats;
using CloudStruct.Recipes;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Points;
using static System.FormattableString;

namespace CloudStruct.Commands;

/// <summary>inspect: what a cloud file holds, and what is wrong with it. No point is read.</summary>
internal sealed class InspectCommand(TextWriter output, TextWriter error)
{
    private static readonly JsonSerializerOptions Layout = new() { WriteIndented = true, NewLine = "\n", Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping };

    private readonly Argument<string[]> files = new("FILE") { Description = "Cloud files", Arity = ArgumentArity.OneOrMore };
    private readonly Option<bool> json = new("--json") { Description = "Print as JSON" };

    /// <summary>Shown beneath the help.</summary>
    public static string[] Examples { get; } =
    [
        "cloudstruct inspect clouds/tile-1.las",
        "cloudstruct inspect clouds/*.las --json",
    ];

    /// <summary>The command, with its options and its work.</summary>
    public Command Describe(Func<ParseResult, Func<CancellationToken, int>, int> guard)
    {
        var command = new Command(
            "inspect",
            "Show what cloud files hold (format, points, extent, colour, coordinate system) and what is wrong with them.") { files, json };
        command.SetAction(parsed => guard(parsed, stop => Inspect(parsed.GetValue(files)!, parsed.GetValue(json), stop)));
        return command;
    }

    private int Inspect(string[] names, bool asJson, CancellationToken stop)
    {
        var all = new JsonArray();
        int bad = 0;
        foreach (string name in names)
        {
            stop.ThrowIfCancellationRequested();
            try
            {
                CloudHeader header = CloudFiles.Inspect(name);
                all.Add((JsonNode)Facts(header));
                if (!asJson) output.WriteLine(Text(header));
            }
            catch (InputException e)
            {
                bad++;
                all.Add((JsonNode)new JsonObject { ["file"] = Path.GetFileName(name), ["refused"] = e.Message });
                if (!asJson) error.WriteLine(e.Message);
            }
        }

        if (asJson) output.WriteLine(all.ToJsonString(Layout));
        return bad == 0 ? ExitCode.Done : bad == names.Length ? ExitCode.BadInput : ExitCode.InPart;
    }

    private static JsonObject Facts(CloudHeader h)
    {
        var facts = new JsonObject();
        foreach (HeaderFact f in h.Facts) facts[f.Name] = f.Value;
        return new JsonObject
        {
            ["file"] = h.Name,
            ["format"] = h.Format,
            ["bytes"] = h.Bytes,
            ["points"] = h.Points,
            ["triangles"] = h.Triangles,
            ["colour"] = h.HasColour,
            ["min"] = h.Min is { } lo ? new JsonArray(lo.X, lo.Y, lo.Z) : null,
            ["max"] = h.Max is { } hi ? new JsonArray(hi.X, hi.Y, hi.Z) : null,
            ["crs"] = new JsonObject
            {
                ["name"] = h.Crs.Name,
                ["kind"] = Words.Snake(h.Crs.Kind.ToString()),
                ["epsg"] = h.Crs.Epsg == 0 ? null : h.Crs.Epsg,
                ["horizontal_unit_m"] = h.Crs.HorizontalUnitM,
                ["vertical_unit_m"] = h.Crs.VerticalUnitM,
                ["vertical"] = h.Crs.VerticalName,
                ["source"] = h.Crs.Source,
            },
            ["date"] = h.Date,
            ["facts"] = facts,
            ["problems"] = new JsonArray([.. h.Problems.Select(p => (JsonNode)p)]),
        };
    }

    private static string Text(CloudHeader h)
    {
        var lines = new List<string>
        {
            h.Name,
            $"  format      {h.Format}",
            Invariant($"  size        {h.Bytes:N0} bytes"),
            h.Triangles > 0 ? Invariant($"  mesh        {h.Triangles:N0} triangles, {h.Points:N0} points to sample or as vertices") : Invariant($"  points      {h.Points:N0}"),
            $"  colour      {(h.HasColour ? "yes" : "no")}",
        };
        if (h is { Min: { } lo, Max: { } hi })
        {
            lines.Add(Invariant($"  lowest      {lo.X:0.###} {lo.Y:0.###} {lo.Z:0.###}"));
            lines.Add(Invariant($"  highest     {hi.X:0.###} {hi.Y:0.###} {hi.Z:0.###}"));
            lines.Add(Invariant($"  extent      {hi.X - lo.X:0.###} x {hi.Y - lo.Y:0.###} x {hi.Z - lo.Z:0.###} file units"));
        }

        lines.Add(h.Crs.Source == "none"
            ? "  crs         none stated"
            : Invariant($"  crs         {h.Crs.Name} ({Words.Snake(h.Crs.Kind.ToString())}, from {h.Crs.Source}; unit {h.Crs.HorizontalUnitM:0.######} m, up {h.Crs.VerticalUnitM:0.######} m)"));
        if (h.Date.Length > 0) lines.Add($"  date        {h.Date}");
        lines.AddRange(h.Facts.Select(f => $"  {f.Name,-11} {f.Value}"));
        lines.AddRange(h.Problems.Select(p => $"  PROBLEM     {p}"));
        return string.Join('\n', lines);
    }
}
