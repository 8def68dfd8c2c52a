namespace CloudStruct.Records.Width;

/// <summary>How a width changes along strike.</summary>
public enum WidthTrendKind
{
    /// <summary>Suddenly, at one place.</summary>
    Step,

    /// <summary>Evenly over the length that was measured.</summary>
    Taper,
}
