using CloudStruct.Records.Frame;

namespace CloudStruct.Formats;

/// <summary>One feature.</summary>
/// <param name="Points">Vertices in map coordinates; none for a table.</param>
/// <param name="Values">One a column: text, whole number, double, or null where not determined.</param>
public sealed record GeoFeature(Vec3[] Points, object?[] Values);
