namespace CloudStruct.Records.Frame;

/// <summary>One parameter of a map projection.</summary>
/// <param name="Name">Plain snake-case name with its unit: "central_meridian_deg".</param>
/// <param name="Value">Value in that unit.</param>
public sealed record CrsParameter(string Name, double Value);
