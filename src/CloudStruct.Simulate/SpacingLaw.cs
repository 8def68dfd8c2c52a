namespace CloudStruct.Simulate;

/// <summary>How the distances of neighbouring joints of a set scatter.</summary>
public enum SpacingLaw
{
    /// <summary>Little: each distance lies between about half and twice the mean.</summary>
    Even,

    /// <summary>As at random: negative-exponential.</summary>
    Random,

    /// <summary>Lognormal: many close, some far.</summary>
    Lognormal,
}
