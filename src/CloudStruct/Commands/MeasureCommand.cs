using System.CommandLine;
using CloudStruct.Runs;
using CloudStruct.Runs.Board;

namespace CloudStruct.Commands;

/// <summary>measure: the main job.</summary>
internal sealed class MeasureCommand(TextWriter output, TextWriter error)
{
    private readonly Argument<string> survey = new("SURVEY") { Description = "Survey folder (clouds in 'clouds/', notes in 'survey.yaml'), a bare folder of clouds, or one cloud file" };
    private readonly RunOptions options = new();

    /// <summary>Shown beneath the help.</summary>
    public static string[] Examples { get; } =
    [
        "cloudstruct measure surveys/north-cliff",
        "cloudstruct measure cliff.las --out cliff-results --recipe quick-look",
        "cloudstruct measure surveys/north-cliff --recipe my-settings.yaml --threads 4 --json",
    ];

    /// <summary>The command, with its options and its work.</summary>
    public Command Describe(Func<ParseResult, Func<CancellationToken, int>, int> guard)
    {
        var command = new Command(
            "measure",
            "Measure a survey: faces, contacts, true width along strike, sets, stereonets, classified cloud, report.");
        command.Arguments.Add(survey);
        options.AddTo(command);
        command.SetAction(parsed => guard(parsed, stop =>
        {
            MeasureRequest request = options.Request(parsed, parsed.GetValue(survey)!);
            return Measure(request, parsed.GetValue(options.Json), parsed.GetValue(options.Profile), stop);
        }));
        return command;
    }

    /// <summary>Measures and says what was found.</summary>
    public int Measure(MeasureRequest request, bool json, bool profile, CancellationToken stop)
    {
        MeasureOutcome outcome = LiveBoard.Show(board => new MeasureRun(request, board, stop).Run());
        output.Write(json ? RunSummary.Json(outcome) : RunSummary.Text(outcome));
        if (profile) error.Write(RunSummary.Profile(outcome));
        return outcome.ExitCode;
    }
}
