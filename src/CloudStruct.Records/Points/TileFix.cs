namespace CloudStruct.Records.Points;

/// <summary>What the intake does to the points of one file on their way into the survey frame.</summary>
public sealed record TileFix
{
    /// <summary>File name.</summary>
    public string Name { get; init; } = "";

    /// <summary>Points read.</summary>
    public long PointsRead { get; init; }

    /// <summary>Points that the file itself marks as deleted; not among those read.</summary>
    public long Withheld { get; init; }

    /// <summary>Points dropped because a coordinate was not a number.</summary>
    public long NotANumber { get; init; }

    /// <summary>Points dropped as far outliers.</summary>
    public long FarOutliers { get; init; }

    /// <summary>Points dropped because another file, or this one, holds the same point.</summary>
    public long Doubled { get; init; }

    /// <summary>Points left out because another file shows the same ground and was chosen there.</summary>
    public long Overlapped { get; init; }

    /// <summary>Added to z so that overlapping tiles agree [m].</summary>
    public double ShiftZM { get; init; }

    /// <summary>Colour values are divided by 2 to this power to give 0-255: 0 or 8.</summary>
    public int ColourShift { get; init; }

    /// <summary>True when the whole file repeats another and is left out.</summary>
    public bool IsCopy { get; init; }
}
