using System.CommandLine;
using System.CommandLine.Help;
using System.CommandLine.Invocation;

namespace CloudStruct.Commands;

/// <summary>The usual help with examples beneath it.</summary>
/// <param name="examples">Examples by the name of their command.</param>
internal sealed class HelpWithExamples(IReadOnlyDictionary<string, string[]> examples) : SynchronousCommandLineAction
{
    private readonly HelpAction usual = new();

    /// <inheritdoc/>
    public override int Invoke(ParseResult parseResult)
    {
        int code = usual.Invoke(parseResult);
        if (!examples.TryGetValue(parseResult.CommandResult.Command.Name, out string[]? lines)) return code;
        TextWriter output = parseResult.InvocationConfiguration.Output;
        output.WriteLine("Examples:");
        foreach (string line in lines) output.WriteLine("  " + line);
        return code;
    }
}
