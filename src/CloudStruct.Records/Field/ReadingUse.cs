namespace CloudStruct.Records.Field;

/// <summary>What a reading is for.</summary>
public enum ReadingUse
{
    /// <summary>To judge the result by; it never enters it.</summary>
    Check,

    /// <summary>To add what the rock in the model does not show.</summary>
    Prior,
}
