namespace CloudStruct.Records.Frame;

/// <summary>What ties the model to the ground.</summary>
public enum ReferenceKind
{
    /// <summary>Nothing stated in survey.yaml.</summary>
    NotStated,

    /// <summary>Ground control points.</summary>
    Control,

    /// <summary>RTK or PPK camera positions.</summary>
    Rtk,

    /// <summary>Plain camera positions.</summary>
    CameraPositions,

    /// <summary>A scale bar only.</summary>
    ScaledOnly,

    /// <summary>Nothing: angles are in the model's frame.</summary>
    None,
}
