namespace CloudStruct.Records.Contacts;

/// <summary>The side of the rock that a face is on.</summary>
public enum FaceDomain
{
    /// <summary>Not decided (no dike side can be told, or cover).</summary>
    Unknown,

    /// <summary>Host rock.</summary>
    Host,

    /// <summary>Dike rock.</summary>
    Dike,

    /// <summary>An exposed contact surface.</summary>
    Margin,
}
