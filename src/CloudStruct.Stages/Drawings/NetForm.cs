namespace CloudStruct.Stages.Drawings;

/// <summary>How nets are projected.</summary>
public enum NetForm
{
    /// <summary>Lambert's azimuthal equal-area projection: densities can be judged by eye.</summary>
    EqualArea,

    /// <summary>The stereographic projection: angles and circles keep their form.</summary>
    EqualAngle,
}
