namespace CloudStruct.Records.Contacts;

/// <summary>What the evidence of a contact fixes.</summary>
public enum Constraint
{
    /// <summary>Strike and dip.</summary>
    Plane,

    /// <summary>Only a direction: the trace is too straight to give a dip.</summary>
    Line,
}
