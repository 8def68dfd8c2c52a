namespace CloudStruct.Records.Drawings;

/// <summary>One entry of a picture's key: what a colour stands for.</summary>
/// <param name="Red">0-255.</param>
/// <param name="Green">0-255.</param>
/// <param name="Blue">0-255.</param>
/// <param name="Label">What it stands for: "dike".</param>
public sealed record ViewKey(byte Red, byte Green, byte Blue, string Label);
