using System.CommandLine;
using CloudStruct.Recipes;
using CloudStruct.Runs;

namespace CloudStruct.Commands;

/// <summary>Options that measure and demo share.</summary>
internal sealed class RunOptions
{
    private readonly Option<string?> place = new("--out") { Description = "Folder for the results (default: 'results' in the survey)", HelpName = "DIR" };
    private readonly Option<string?> recipe = new("--recipe") { Description = $"Settings by name ({string.Join(", ", RecipeShelf.Names)}) or from a YAML file", HelpName = "NAME|FILE" };
    private readonly Option<int?> threads = new("--threads") { Description = "Workers (default: all cores); results do not depend on it", HelpName = "N" };
    private readonly Option<double?> memory = new("--memory-gib") { Description = "Memory budget in GiB (default: 60 % of the machine)", HelpName = "G" };
    private readonly Option<ulong> seed = new("--seed") { Description = "Seed of all random draws", HelpName = "N", DefaultValueFactory = _ => 1 };
    private readonly Option<string?> cache = new("--cache") { Description = "Folder where stage results are kept (default: '.cloudstruct-cache' beside the results)", HelpName = "DIR" };
    private readonly Option<bool> fresh = new("--fresh") { Description = "Compute every stage anew" };

    /// <summary>Time and memory per stage on stderr.</summary>
    public Option<bool> Profile { get; } = new("--profile") { Description = "Show time per stage and peak memory at the end" };

    /// <summary>Summary as JSON on stdout.</summary>
    public Option<bool> Json { get; } = new("--json") { Description = "Print the summary as JSON" };

    /// <summary>Adds all of them to a command, with their checks.</summary>
    public void AddTo(Command command)
    {
        threads.Validators.Add(r =>
        {
            if (r.GetValue(threads) is < 1 or > 1024) r.AddError("--threads must be between 1 and 1024.");
        });
        memory.Validators.Add(r =>
        {
            if (r.GetValue(memory) is { } g && !(g > 0 && g < 1e6)) r.AddError("--memory-gib must be above 0.");
        });
        foreach (Option o in new Option[] { place, recipe, threads, memory, seed, cache, fresh, Profile, Json }) command.Options.Add(o);
    }

    /// <summary>The request for a survey.</summary>
    public MeasureRequest Request(ParseResult parsed, string survey) => new()
    {
        Survey = survey,
        Out = parsed.GetValue(place),
        Recipe = parsed.GetValue(recipe),
        Threads = parsed.GetValue(threads) ?? Environment.ProcessorCount,
        MemoryGib = parsed.GetValue(memory),
        Seed = parsed.GetValue(seed),
        Cache = parsed.GetValue(cache),
        Fresh = parsed.GetValue(fresh),
    };
}
