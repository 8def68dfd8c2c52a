namespace CloudStruct.Records.Classes;

/// <summary>One row of classes.csv.</summary>
public sealed record ClassSummary
{
    /// <summary>The class.</summary>
    public RockClass Class { get; init; }

    /// <summary>Working points.</summary>
    public long Points { get; init; }

    /// <summary>Surface [m²].</summary>
    public double AreaM2 { get; init; }

    /// <summary>Against check labels; null without them.</summary>
    public double? Precision { get; init; }

    /// <summary>Against check labels; null without them.</summary>
    public double? Recall { get; init; }

    /// <summary>Intersection over union against check labels; null without them.</summary>
    public double? Iou { get; init; }
}
