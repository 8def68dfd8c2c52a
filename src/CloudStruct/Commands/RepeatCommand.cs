using System.CommandLine;
using CloudStruct.Formats;
using CloudStruct.Records.Comparing;
using CloudStruct.Stages.Comparing;

namespace CloudStruct.Commands;

/// <summary>repeat: two surveys of one outcrop, held against each other.</summary>
internal sealed class RepeatCommand(TextWriter output)
{
    private readonly Argument<string> first = new("RESULTS") { Description = "Results of the first survey" };
    private readonly Argument<string> second = new("RESULTS2") { Description = "Results of the second survey of the same outcrop" };
    private readonly ComparisonOptions options = new();

    /// <summary>Shown beneath the help.</summary>
    public static string[] Examples { get; } =
    [
        "cloudstruct repeat may/results september/results",
        "cloudstruct repeat may/results september/results --out compared --json",
    ];

    /// <summary>The command, with its options and its work.</summary>
    public Command Describe(Func<ParseResult, Func<CancellationToken, int>, int> guard)
    {
        var command = new Command(
            "repeat",
            "Hold two surveys of one outcrop against each other: the common shift and rotation, and whether what is left keeps within the stated 95 % regions.") { first, second };
        options.AddTo(command);
        command.SetAction(parsed => guard(parsed, _ =>
        {
            MeasuredResults a = ResultsReader.Read(parsed.GetValue(first)!), b = ResultsReader.Read(parsed.GetValue(second)!);
            return options.Finish(parsed, output, Repeating.Of(a, b), a.RunId + " " + b.RunId, parsed.GetValue(first)!);
        }));
        return command;
    }
}
