using static System.FormattableString;

namespace CloudStruct.Runs.Board;

/// <summary>A line per stage, for logs and pipes.</summary>
internal sealed class PlainBoard(TextWriter to) : IBoard
{
    /// <inheritdoc/>
    public Action<double> Begin(string stage, long points) => _ => { };

    /// <inheritdoc/>
    public void End(string stage, double seconds, string note) =>
        to.WriteLine(Invariant($"{stage,-9} {seconds,7:0.0} s{(note.Length > 0 ? "  " + note : "")}"));
}
