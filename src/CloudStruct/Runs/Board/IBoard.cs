namespace CloudStruct.Runs.Board;

/// <summary>Shows how a run goes on; never affects it.</summary>
internal interface IBoard
{
    /// <summary>A stage starts; the returned action takes the share done, 0 to 1, from any thread.</summary>
    /// <param name="stage">Its name.</param>
    /// <param name="points">Points it works on; 0 when it does not count in points.</param>
    Action<double> Begin(string stage, long points);

    /// <summary>The stage ended.</summary>
    /// <param name="stage">Its name.</param>
    /// <param name="seconds">Wall time.</param>
    /// <param name="note">"from the store", points per second, or nothing.</param>
    void End(string stage, double seconds, string note);
}
