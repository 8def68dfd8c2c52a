using CloudStruct.Records.Contacts;
using CloudStruct.Records.Decisions;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Sets;

namespace CloudStruct.Stages.Sets;

/// <summary>What the stage sets takes.</summary>
/// <param name="Frame">The survey frame: north of the attitudes.</param>
/// <param name="Faces">The faces.</param>
/// <param name="Contacts">Domain of every face and whether it is in place; empty arrays: all host, as the faces say.</param>
/// <param name="Described">The cloud: where rock was seen, for spacing.</param>
public sealed record SetsInput(SurveyFrame Frame, FaceSet Faces, ContactsRecord Contacts, DescribedCloud Described)
{
    /// <summary>Zones that the user drew; survey coordinates.</summary>
    public IReadOnlyList<Zone> Zones { get; init; } = [];

    /// <summary>Sets that a geologist joined or split; other decisions are passed over.</summary>
    public IReadOnlyList<Decision> Decisions { get; init; } = [];
}
