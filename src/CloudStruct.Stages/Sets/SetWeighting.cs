namespace CloudStruct.Stages.Sets;

/// <summary>How much a plane counts.</summary>
public enum SetWeighting
{
    /// <summary>Every plane alike, less where its own attitude is uncertain.</summary>
    Count,

    /// <summary>By exposed area: close to area per volume of rock, but a few large faces decide.</summary>
    Area,

    /// <summary>As count, times the reciprocal of what part of planes of that attitude the surface can show, at most ten.</summary>
    Exposure,
}
