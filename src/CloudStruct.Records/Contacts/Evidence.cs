namespace CloudStruct.Records.Contacts;

/// <summary>What an attitude of a contact rests on.</summary>
public enum Evidence
{
    /// <summary>The contact surface itself is exposed.</summary>
    Surface,

    /// <summary>The trace of one margin over relief.</summary>
    Trace,

    /// <summary>Both margins with one common normal.</summary>
    BothMargins,

    /// <summary>A prior from field readings took part.</summary>
    Prior,
}
