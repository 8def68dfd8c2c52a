using System.CommandLine;
using System.CommandLine.Help;
using CloudStruct.Records.Complaints;
using CloudStruct.Runs;

namespace CloudStruct.Commands;

/// <summary>The command line: what each command is, and the one place where outcomes become exit codes.</summary>
internal sealed class CommandLine(TextWriter output, TextWriter error)
{
    private readonly Option<bool> verbose = new("--verbose") { Description = "Show the trace of a fault", Recursive = true };

    /// <summary>Runs a command.</summary>
    public int Run(string[] args)
    {
        var root = new RootCommand(
            "CloudStruct measures rock structure from drone surveys: attitudes of faces and dike contacts, true dike width, sets, stereonets. Every number carries a 95 % interval.")
        {
            verbose,
            new MeasureCommand(output, error).Describe(Guard),
            new DemoCommand(output, error).Describe(Guard),
            new InspectCommand(output, error).Describe(Guard),
            new NetCommand(output).Describe(Guard),
            new FieldCheckCommand(output).Describe(Guard),
            new RepeatCommand(output).Describe(Guard),
        };
        root.Options.OfType<HelpOption>().Single().Action = new HelpWithExamples(new Dictionary<string, string[]>(StringComparer.Ordinal)
        {
            [root.Name] = [DemoCommand.Examples[0], MeasureCommand.Examples[0], InspectCommand.Examples[0]],
            ["measure"] = MeasureCommand.Examples,
            ["demo"] = DemoCommand.Examples,
            ["inspect"] = InspectCommand.Examples,
            ["net"] = NetCommand.Examples,
            ["fieldcheck"] = FieldCheckCommand.Examples,
            ["repeat"] = RepeatCommand.Examples,
        });
        ParseResult parsed = root.Parse(args);
        if (parsed.Errors.Count > 0 && parsed.Action is not HelpWithExamples)
        {
            foreach (System.CommandLine.Parsing.ParseError e in parsed.Errors) error.WriteLine(e.Message);
            error.WriteLine("'cloudstruct --help' lists commands, 'cloudstruct COMMAND --help' their options.");
            return ExitCode.Usage;
        }

        return parsed.Invoke(new InvocationConfiguration { Output = output, Error = error, EnableDefaultExceptionHandler = false, ProcessTerminationTimeout = null });
    }

    private int Guard(ParseResult parsed, Func<CancellationToken, int> work)
    {
        using var interrupts = new Interrupts();
        try
        {
            return work(interrupts.Token);
        }
        catch (Exception e) when (interrupts.Token.IsCancellationRequested && (e is OperationCanceledException || e is AggregateException))
        {
            error.WriteLine("Interrupted. Earlier results are untouched; the next run goes on from the last finished stage.");
            return ExitCode.Interrupted;
        }
        catch (InputException e)
        {
            return Say(e, e.Message, ExitCode.BadInput);
        }
        catch (UsageException e)
        {
            return Say(e, e.Message, ExitCode.Usage);
        }
        catch (MachineException e)
        {
            return Say(e, e.Message, ExitCode.Failed);
        }
        catch (OutOfMemoryException e)
        {
            return Say(e, "memory: the run needed more than this machine, or --memory-gib, allows. Close other programs, raise --memory-gib, or set thin.spacing_m larger.", ExitCode.Failed);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            return Say(e, $"disk: {e.Message} Free space or permissions are the usual causes; earlier results are untouched.", ExitCode.Failed);
        }
        catch (Exception e)
        {
            return Say(e, $"This is a fault of CloudStruct, not of your data: {(e as AggregateException)?.InnerException?.Message ?? e.Message} Run again with --verbose and report what it prints.", ExitCode.Failed);
        }

        int Say(Exception e, string message, int code)
        {
            error.WriteLine(message);
            if (parsed.GetValue(verbose)) error.WriteLine(e);
            return code;
        }
    }
}
