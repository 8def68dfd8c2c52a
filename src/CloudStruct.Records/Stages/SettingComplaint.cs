namespace CloudStruct.Records.Stages;

/// <summary>One setting that cannot be used.</summary>
/// <param name="Key">Full key: "faces.tolerance_m".</param>
/// <param name="Found">The value found, as text.</param>
/// <param name="Rule">What must hold: "must be above 0".</param>
public sealed record SettingComplaint(string Key, string Found, string Rule);
