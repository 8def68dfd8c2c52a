namespace CloudStruct.Accuracy.Deep;

/// <summary>One thing judged: its value and what it weighs.</summary>
/// <param name="Value">Error, ratio, or 1 and 0 for right and wrong.</param>
/// <param name="Weight">1, or an area [m²].</param>
public readonly record struct Sample(double Value, double Weight = 1)
{
    /// <summary>1 for yes, 0 for no.</summary>
    public static Sample Of(bool yes, double weight = 1) => new(yes ? 1 : 0, weight);
}
