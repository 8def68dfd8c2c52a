using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Sets;

/// <summary>A zone that the user drew, in map view.</summary>
/// <param name="Name">Its name: the property name or zone of the feature, else the file's name and a number.</param>
/// <param name="Rings">Outer ring first, then holes; survey coordinates [m], z unused; closed (first equals last).</param>
public sealed record Zone(string Name, Vec3[][] Rings);
