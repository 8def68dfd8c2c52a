namespace CloudStruct.Stages.Faces;

/// <summary>A set of points that is emptied in no time: the serial number of the round in which each was last put in.</summary>
internal sealed class Marks(int points)
{
    private readonly int[] round = new int[points];
    private int now;

    /// <summary>Empties the set.</summary>
    public void Clear()
    {
        if (now == int.MaxValue)
        {
            Array.Clear(round);
            now = 0;
        }

        now++;
    }

    /// <summary>Whether a point is in.</summary>
    public bool Has(int point) => round[point] == now;

    /// <summary>Puts a point in.</summary>
    public void Set(int point) => round[point] = now;
}
