using Spectre.Console;
using static System.FormattableString;

namespace CloudStruct.Runs.Board;

/// <summary>Bars on a terminal, one per stage.</summary>
internal sealed class LiveBoard(ProgressContext context) : IBoard
{
    private readonly Dictionary<string, ProgressTask> tasks = [];

    /// <summary>Runs work under bars on stderr; plain lines where stderr is not a terminal.</summary>
    public static T Show<T>(Func<IBoard, T> work)
    {
        if (Console.IsErrorRedirected) return work(new PlainBoard(Console.Error));
        IAnsiConsole console = AnsiConsole.Create(new AnsiConsoleSettings { Out = new AnsiConsoleOutput(Console.Error) });
        return console.Progress().AutoClear(false).HideCompleted(false)
            .Columns(new TaskDescriptionColumn { Alignment = Justify.Left }, new ProgressBarColumn { Width = 30 }, new PercentageColumn(), new RateColumn(), new RemainingTimeColumn(), new PeakColumn())
            .Start(context => work(new LiveBoard(context)));
    }

    /// <inheritdoc/>
    public Action<double> Begin(string stage, long points)
    {
        ProgressTask task = context.AddTask(stage, maxValue: 1);
        task.State.Update<long>(RateColumn.Points, _ => points);
        tasks[stage] = task;
        return share => task.Value = Math.Max(task.Value, Math.Clamp(share, 0, 1));
    }

    /// <inheritdoc/>
    public void End(string stage, double seconds, string note)
    {
        ProgressTask task = tasks[stage];
        task.Value = 1;
        task.Description = Invariant($"{stage} {seconds:0.0} s{(note.Length > 0 ? ", " + note : "")}");
        task.StopTask();
    }
}
