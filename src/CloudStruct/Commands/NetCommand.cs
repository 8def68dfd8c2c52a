using System.CommandLine;
using System.Text.Encodings.Web;
using System.Text.Json;
using System.Text.Json.Nodes;
using CloudStruct.Formats;
using CloudStruct.Formats.Tables;
using CloudStruct.Products;
using CloudStruct.Products.Comparing;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Drawings;
using CloudStruct.Runs;
using CloudStruct.Stages.Drawings;

namespace CloudStruct.Commands;

/// <summary>net: a stereonet and its statistics from any table of attitudes.</summary>
internal sealed class NetCommand(TextWriter output)
{
    private static readonly JsonSerializerOptions Layout = new() { WriteIndented = true, NewLine = "\n", Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping };

    private readonly Argument<string> table = new("TABLE.csv") { Description = "Table with an attitude in each row" };
    private readonly Option<string?> by = new("--by") { Description = "Column whose words make groups, each with its own mean: set, domain, kind" };
    private readonly Option<string?> notation = new("--notation") { Description = "How two numbers in the column attitude are meant: strike/dip or dip direction/dip" };
    private readonly Option<string> north = new("--north") { Description = "What the azimuths count from, for the sentence: true, grid or magnetic", DefaultValueFactory = _ => "the table's" };
    private readonly Option<string> folder = new("--out") { Description = "Folder for the figure (default: here)", DefaultValueFactory = _ => "." };
    private readonly Option<bool> json = new("--json") { Description = "Print the statistics as JSON" };

    /// <summary>Shown beneath the help.</summary>
    public static string[] Examples { get; } =
    [
        "cloudstruct net notebook.csv --notation strike/dip --north magnetic",
        "cloudstruct net quarry/results/tables/faces.csv --by set --out figures",
    ];

    /// <summary>The command, with its options and its work.</summary>
    public Command Describe(Func<ParseResult, Func<CancellationToken, int>, int> guard)
    {
        var command = new Command("net", "Draw a stereonet of any table of attitudes (strike and dip, dip direction and dip, poles, N35E/60SE) and state its statistics.") { table, by, notation, north, folder, json };
        command.SetAction(parsed => guard(parsed, stop => Draw(parsed, stop)));
        return command;
    }

    private int Draw(ParseResult parsed, CancellationToken stop)
    {
        string path = parsed.GetValue(table)!, place = parsed.GetValue(folder)!;
        string? how = parsed.GetValue(notation);
        if (how is not (null or "strike/dip" or "dip direction/dip")) throw new UsageException("--notation: write \"strike/dip\" or \"dip direction/dip\".");
        if (parsed.GetValue(north) is not ("true" or "grid" or "magnetic" or "the table's")) throw new UsageException("--north: write true, grid or magnetic.");
        if (File.Exists(place)) throw new UsageException($"--out {Path.GetFileName(place)}: a file of this name exists. Name a folder.");
        if (!File.Exists(path)) throw new InputException(Path.GetFileName(path), "the table does not exist", "no such file", "Name a table");
        (Attitude Attitude, string Group, double AreaM2)[] rows = AttitudeTable.Read(path, how, parsed.GetValue(by));
        string id = Fingerprint.OfText([Fingerprint.Version, .. rows.Select(r => r.ToString())])[..12];
        (NetDrawing net, TableNet.GroupStatistics[] statistics) = TableNet.Of(rows, Path.GetFileNameWithoutExtension(path) + "-net", parsed.GetValue(north) + " north", Environment.ProcessorCount, stop);
        Directory.CreateDirectory(place);
        IReadOnlyList<string> files = NetWriter.Write(place, net, new RunFacts { ToolVersion = Fingerprint.Version, RunId = id });
        if (parsed.GetValue(json)) output.WriteLine(new JsonArray([.. statistics.Select(Json)]).ToJsonString(Layout));
        else
        {
            output.WriteLine(net.Sentence);
            foreach (string file in files) output.WriteLine(Path.GetRelativePath(Directory.GetCurrentDirectory(), Path.Combine(place, file)));
        }

        return ExitCode.Done;
    }

    private static JsonObject Json(TableNet.GroupStatistics s) => new()
    {
        ["group"] = s.Group, ["count"] = s.Count,
        ["strike_deg"] = Number(CsvKind.AzimuthDeg, s.Mean.StrikeDeg), ["dip_deg"] = Number(CsvKind.AngleDeg, s.Mean.DipDeg),
        ["cone95_deg"] = Number(CsvKind.AngleDeg, s.Cone95Deg), ["kappa"] = Number(CsvKind.Number, s.Kappa),
        ["s1"] = Number(CsvKind.Number, s.S1), ["s2"] = Number(CsvKind.Number, s.S2), ["s3"] = Number(CsvKind.Number, s.S3),
        ["shape"] = Number(CsvKind.Number, s.Shape), ["strength"] = Number(CsvKind.Number, s.Strength),
    };

    // With the digits that the tables have; null where nothing is stated.
    private static double? Number(CsvKind kind, double value) => CellText.Of(kind, value) is { Length: > 0 } text ? double.Parse(text, System.Globalization.CultureInfo.InvariantCulture) : null;
}
