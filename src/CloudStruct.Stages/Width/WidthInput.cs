using CloudStruct.Records.Classes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Width;

/// <summary>What the stage width takes.</summary>
/// <param name="Described">The described cloud.</param>
/// <param name="Classes">Its classes.</param>
/// <param name="Contacts">Centre lines and margin traces.</param>
public sealed record WidthInput(DescribedCloud Described, ClassifiedCloud Classes, ContactsRecord Contacts);
