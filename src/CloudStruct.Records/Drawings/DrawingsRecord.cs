namespace CloudStruct.Records.Drawings;

/// <summary>What the stage drawings gives: all that sheets need computed.</summary>
public sealed record DrawingsRecord
{
    /// <summary>Nets: one per domain with faces, one for contacts.</summary>
    public NetDrawing[] Nets { get; init; } = [];

    /// <summary>One per dike.</summary>
    public WidthDrawing[] Widths { get; init; } = [];

    /// <summary>Pictures of the cloud: natural colour and classes, plan and front.</summary>
    public ViewImage[] Views { get; init; } = [];
}
