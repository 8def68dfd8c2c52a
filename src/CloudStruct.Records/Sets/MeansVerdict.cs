namespace CloudStruct.Records.Sets;

/// <summary>What a test of a common mean says.</summary>
public enum MeansVerdict
{
    /// <summary>Two means: one would give such an angle less than once in twenty.</summary>
    Apart,

    /// <summary>They may be one, and means 10 deg apart would have been told apart.</summary>
    Alike,

    /// <summary>They may be one, but so much is unknown that they might as well be 10 deg apart.</summary>
    Undecided,
}
