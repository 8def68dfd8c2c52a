using CloudStruct.Records.Classes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Field;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Contacts;

/// <summary>What the stage contacts takes.</summary>
/// <param name="Described">The described cloud.</param>
/// <param name="Classes">Classes and dikes found.</param>
/// <param name="Faces">Faces, whose domain is told here.</param>
/// <param name="Baseline">Line that fixes chainage, local [m]; empty when there is none.</param>
public sealed record ContactsInput(DescribedCloud Described, ClassifiedCloud Classes, FaceSet Faces, Vec3[] Baseline)
{
    /// <summary>Compass readings, places local [m]; those for use as prior add what the traces do not show.</summary>
    public FieldReading[] Readings { get; init; } = [];

    /// <summary>Domain decided by hand per face, null where nothing was; empty when nothing was at all.</summary>
    public FaceDomain?[] Domains { get; init; } = [];
}
