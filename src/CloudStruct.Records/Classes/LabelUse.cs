namespace CloudStruct.Records.Classes;

/// <summary>What a hand label is for.</summary>
public enum LabelUse
{
    /// <summary>Teaches the classifier.</summary>
    Train,

    /// <summary>Only judges the result.</summary>
    Check,

    /// <summary>Takes points out of everything: people, targets, walls, roads.</summary>
    Ignore,
}
