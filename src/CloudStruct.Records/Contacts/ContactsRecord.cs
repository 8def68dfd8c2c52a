namespace CloudStruct.Records.Contacts;

/// <summary>What the stage contacts gives.</summary>
public sealed record ContactsRecord
{
    /// <summary>One per dike, in order of their numbers.</summary>
    public DikeFrame[] Dikes { get; init; } = [];

    /// <summary>Rows of contacts.csv.</summary>
    public Contact[] Contacts { get; init; } = [];

    /// <summary>Margin polylines; several per margin where it is broken.</summary>
    public MarginTrace[] Traces { get; init; } = [];

    /// <summary>Domain of every face, in the order of the faces.</summary>
    public FaceDomain[] DomainOfFace { get; init; } = [];

    /// <summary>Dike that every face lies in or on the margin of, in the order of the faces; 0 for host and unknown. Empty when that was not told.</summary>
    public int[] DikeOfFace { get; init; } = [];

    /// <summary>Whether the rock of every face is in place, from the classes of its points, in the order of the faces.</summary>
    public Faces.InPlace[] InPlaceOfFace { get; init; } = [];
}
