using Spectre.Console;
using Spectre.Console.Rendering;
using static System.FormattableString;

namespace CloudStruct.Runs.Board;

/// <summary>Points per second of a stage that is under way.</summary>
internal sealed class RateColumn : ProgressColumn
{
    /// <summary>Key under which a task keeps its number of points.</summary>
    public const string Points = "points";

    /// <inheritdoc/>
    public override IRenderable Render(RenderOptions options, ProgressTask task, TimeSpan deltaTime)
    {
        long points = task.State.Get<long>(Points);
        double seconds = task.ElapsedTime?.TotalSeconds ?? 0;
        return new Text(points > 0 && seconds > 0.5 && !task.IsFinished ? Invariant($"{task.Value * points / seconds / 1e6:0.00} M points/s") : "");
    }

    /// <inheritdoc/>
    public override int? GetColumnWidth(RenderOptions options) => 16;
}
