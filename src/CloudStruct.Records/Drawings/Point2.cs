namespace CloudStruct.Records.Drawings;

/// <summary>A place on a sheet, in the units its drawing states.</summary>
/// <param name="X">Right.</param>
/// <param name="Y">Up.</param>
public readonly record struct Point2(double X, double Y);
