namespace CloudStruct.Records.Width;

/// <summary>What could be measured at a station.</summary>
public enum StationStatus
{
    /// <summary>Both margins seen and the dip known.</summary>
    Measured,

    /// <summary>Margin A is hidden.</summary>
    AHidden,

    /// <summary>Margin B is hidden.</summary>
    BHidden,

    /// <summary>Both margins are hidden.</summary>
    BothHidden,

    /// <summary>Both margins seen, but nothing fixes the dip: only the apparent width is given.</summary>
    Unconstrained,
}
