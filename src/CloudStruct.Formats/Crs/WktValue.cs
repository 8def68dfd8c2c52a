namespace CloudStruct.Formats.Crs;

/// <summary>A value in well-known text.</summary>
/// <param name="Text">Without quotes.</param>
/// <param name="IsQuoted">Whether it was a quoted text.</param>
internal readonly record struct WktValue(string Text, bool IsQuoted);
