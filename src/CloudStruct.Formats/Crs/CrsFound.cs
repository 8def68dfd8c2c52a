using CloudStruct.Records.Frame;

namespace CloudStruct.Formats.Crs;

/// <summary>A coordinate system and what was doubtful about it.</summary>
/// <param name="Crs">The system; <see cref="CrsInfo.None"/> when nothing usable is stated.</param>
/// <param name="Problems">Sentences for the user.</param>
public sealed record CrsFound(CrsInfo Crs, string[] Problems);
