namespace CloudStruct.Records.Faces;

/// <summary>Whether a face belongs to rock in place.</summary>
public enum InPlace
{
    /// <summary>Part of the outcrop.</summary>
    Yes,

    /// <summary>On a loose block.</summary>
    No,

    /// <summary>Cannot be told.</summary>
    Unknown,
}
