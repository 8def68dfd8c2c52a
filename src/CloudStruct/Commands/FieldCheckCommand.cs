using System.CommandLine;
using CloudStruct.Formats;
using CloudStruct.Records.Comparing;
using CloudStruct.Records.Field;
using CloudStruct.Records.Frame;
using CloudStruct.Runs;
using CloudStruct.Stages.Comparing;

namespace CloudStruct.Commands;

/// <summary>fieldcheck: a model against compass readings.</summary>
internal sealed class FieldCheckCommand(TextWriter output)
{
    private readonly Argument<string> results = new("RESULTS") { Description = "Results of a survey" };
    private readonly Argument<string> readings = new("READINGS.csv") { Description = "Compass readings: id, x_m, y_m, kind, an attitude, north" };
    private readonly Option<double> within = new("--within-m") { Description = "How far from a face or contact a reading may lie, beside its own sigma_m", DefaultValueFactory = _ => 0.5 };
    private readonly Option<double?> declination = new("--declination-deg") { Description = "For magnetic readings without declination_deg, east positive" };
    private readonly Option<string?> notation = new("--notation") { Description = "How two numbers in the column attitude are meant: strike/dip or dip direction/dip" };
    private readonly ComparisonOptions options = new();

    /// <summary>Shown beneath the help.</summary>
    public static string[] Examples { get; } =
    [
        "cloudstruct fieldcheck quarry/results quarry/field/readings.csv",
        "cloudstruct fieldcheck quarry/results readings.csv --within-m 1 --declination-deg 3.2",
    ];

    /// <summary>The command, with its options and its work.</summary>
    public Command Describe(Func<ParseResult, Func<CancellationToken, int>, int> guard)
    {
        var command = new Command(
            "fieldcheck",
            "Hold a model against compass readings: differences beside what the cones predict, the common rotation (a wrong declination shows there), Watson's test of a common mean.") { results, readings };
        command.Options.Add(within);
        command.Options.Add(declination);
        command.Options.Add(notation);
        options.AddTo(command);
        command.SetAction(parsed => guard(parsed, _ =>
        {
            double reach = parsed.GetValue(within);
            if (!(reach > 0 && reach <= 100)) throw new UsageException("--within-m: a distance above 0 and up to 100 m is needed.");
            string? how = parsed.GetValue(notation);
            if (how is not (null or "strike/dip" or "dip direction/dip")) throw new UsageException("--notation: write \"strike/dip\" or \"dip direction/dip\".");
            string? east = parsed.GetValue(declination)?.ToString(System.Globalization.CultureInfo.InvariantCulture);
            MeasuredResults model = ResultsReader.Read(parsed.GetValue(results)!);
            FieldReading[] read = EvidenceFiles.ReadReadings(parsed.GetValue(readings)!, new Declination(east, new CrsInfo(), null), how);
            return options.Finish(parsed, output, FieldChecking.Of(model, read, reach), model.RunId, parsed.GetValue(results)!);
        }));
        return command;
    }
}
