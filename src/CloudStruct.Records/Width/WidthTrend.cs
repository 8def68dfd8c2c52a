namespace CloudStruct.Records.Width;

/// <summary>One row of width_trends.csv: a change of width along strike that the stations show beyond their scatter.</summary>
public sealed record WidthTrend
{
    /// <summary>Number of the dike.</summary>
    public int Dike { get; init; }

    /// <summary>Step or taper.</summary>
    public WidthTrendKind Kind { get; init; }

    /// <summary>Where: place of the step with its 95 % limits; middle and ends of the taper [m].</summary>
    public Estimate ChainageM { get; init; } = new(0, 0, 0);

    /// <summary>Change of the true width toward increasing chainage: across the step, or from end to end of the taper [m].</summary>
    public Estimate SizeM { get; init; } = new(0, 0, 0);

    /// <summary>Probability of as large a change in stations of this scatter and correlation without one.</summary>
    public double PValue { get; init; }

    /// <summary>True width before the change [m].</summary>
    public double WidthBeforeM { get; init; }

    /// <summary>True width after it [m].</summary>
    public double WidthAfterM { get; init; }
}
