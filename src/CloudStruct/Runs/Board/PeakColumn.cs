using Spectre.Console;
using Spectre.Console.Rendering;
using static System.FormattableString;

namespace CloudStruct.Runs.Board;

/// <summary>Peak memory of the program so far, beside the stage under way.</summary>
internal sealed class PeakColumn : ProgressColumn
{
    /// <inheritdoc/>
    public override IRenderable Render(RenderOptions options, ProgressTask task, TimeSpan deltaTime) =>
        new Text(task.IsFinished ? "" : Invariant($"{RunRecord.PeakGib():0.0} GiB"));

    /// <inheritdoc/>
    public override int? GetColumnWidth(RenderOptions options) => 8;
}
