using System.CommandLine;
using CloudStruct.Runs;

namespace CloudStruct.Commands;

/// <summary>demo: writes the built-in demonstration survey and measures it.</summary>
internal sealed class DemoCommand(TextWriter output, TextWriter error)
{
    private readonly Argument<string> folder = new("DIR") { Description = "Folder for the survey (default: cloudstruct-demo)", DefaultValueFactory = _ => "cloudstruct-demo" };
    private readonly RunOptions options = new();

    /// <summary>Shown beneath the help.</summary>
    public static string[] Examples { get; } =
    [
        "cloudstruct demo",
        "cloudstruct demo try-it --seed 7 --profile",
    ];

    /// <summary>The command, with its options and its work.</summary>
    public Command Describe(Func<ParseResult, Func<CancellationToken, int>, int> guard)
    {
        var command = new Command(
            "demo",
            "Write the built-in demonstration survey, an outcrop in an invented place whose truth is known, and measure it.");
        command.Arguments.Add(folder);
        options.AddTo(command);
        command.SetAction(parsed => guard(parsed, stop =>
        {
            string place = parsed.GetValue(folder)!;
            MeasureRequest request = options.Request(parsed, place);
            DemoFolder.Write(place, request.Seed, request.Threads, stop);
            return new MeasureCommand(output, error).Measure(request, parsed.GetValue(options.Json), parsed.GetValue(options.Profile), stop);
        }));
        return command;
    }
}
