namespace CloudStruct.Records.Points;

/// <summary>One row of checkpoints.csv.</summary>
public sealed record ControlResidual
{
    /// <summary>Name of the point.</summary>
    public string Id { get; init; } = "";

    /// <summary>control or check.</summary>
    public string Role { get; init; } = "";

    /// <summary>Model minus survey [m]; null without model coordinates.</summary>
    public double? DxM { get; init; }

    /// <summary>Model minus survey [m].</summary>
    public double? DyM { get; init; }

    /// <summary>Model minus survey [m].</summary>
    public double? DzM { get; init; }

    /// <summary>Distance of the surveyed place from the model's surface along its normal [m]; null when no surface is near.</summary>
    public double? AlongNormalM { get; init; }
}
