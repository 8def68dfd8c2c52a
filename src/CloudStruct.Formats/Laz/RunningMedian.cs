namespace CloudStruct.Formats.Laz;

/// <summary>Five sorted values whose middle predicts the next; the extreme on the side that was left is dropped. Not the median of the last five.</summary>
internal struct RunningMedian
{
    private int v0, v1, v2, v3, v4;
    private bool dropLow;   // the first drop is at the high end: the default of a struct

    /// <summary>The prediction.</summary>
    public readonly int Middle => v2;

    /// <summary>Takes a value in.</summary>
    public void Add(int d)
    {
        int old = v2;
        if (!dropLow)
        {
            // The highest goes; d is put among the other four.
            if (d < v0) (v4, v3, v2, v1, v0) = (v3, v2, v1, v0, d);
            else if (d < v1) (v4, v3, v2, v1) = (v3, v2, v1, d);
            else if (d < v2) (v4, v3, v2) = (v3, v2, d);
            else if (d < v3) (v4, v3) = (v3, d);
            else v4 = d;
            if (d >= old) dropLow = true;
        }
        else
        {
            if (d >= v4) (v0, v1, v2, v3, v4) = (v1, v2, v3, v4, d);
            else if (d >= v3) (v0, v1, v2, v3) = (v1, v2, v3, d);
            else if (d >= v2) (v0, v1, v2) = (v1, v2, d);
            else if (d >= v1) (v0, v1) = (v1, d);
            else v0 = d;
            if (d <= old) dropLow = false;
        }
    }
}
