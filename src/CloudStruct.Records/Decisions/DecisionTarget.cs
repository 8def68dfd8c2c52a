namespace CloudStruct.Records.Decisions;

/// <summary>What a decision is about.</summary>
public enum DecisionTarget
{
    /// <summary>A face.</summary>
    Face,

    /// <summary>A row of the contacts.</summary>
    Contact,

    /// <summary>A set, or two of them.</summary>
    Set,

    /// <summary>Only a place.</summary>
    Place,
}
