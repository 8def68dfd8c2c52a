namespace CloudStruct.Records.Field;

/// <summary>What a compass was laid on.</summary>
public enum ReadingKind
{
    /// <summary>A fracture face.</summary>
    Face,

    /// <summary>A contact between dike and host.</summary>
    Contact,
}
