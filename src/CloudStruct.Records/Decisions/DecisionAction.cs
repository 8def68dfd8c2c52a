namespace CloudStruct.Records.Decisions;

/// <summary>What a geologist decided by hand.</summary>
public enum DecisionAction
{
    /// <summary>A face is none, or is not wanted: it takes no part in anything.</summary>
    Drop,

    /// <summary>A face is on another side of the rock than was found.</summary>
    Domain,

    /// <summary>Two sets of one domain are one.</summary>
    JoinSets,

    /// <summary>A set is two: each plane goes to the nearer of two attitudes.</summary>
    SplitSet,

    /// <summary>A contact was seen on the ground, or in the photographs, and is where the row says.</summary>
    ConfirmContact,

    /// <summary>A remark about a face, a contact, a set or a place; it changes nothing.</summary>
    Note,
}
