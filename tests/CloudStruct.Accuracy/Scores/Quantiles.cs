namespace CloudStruct.Accuracy.Scores;

/// <summary>Order statistics.</summary>
public static class Quantiles
{
    /// <summary>The value below which a share of the others lies; NaN of nothing.</summary>
    public static double Of(IEnumerable<double> values, double share)
    {
        double[] sorted = [.. values.Order()];
        return sorted.Length == 0 ? double.NaN : sorted[(int)Math.Min(sorted.Length - 1, share * sorted.Length)];
    }
}
