using CloudStruct.Records.Width;

namespace CloudStruct.Records.Drawings;

/// <summary>A station on the map.</summary>
/// <param name="At">Local east and north [m].</param>
/// <param name="Dike">Number of the dike.</param>
/// <param name="Number">Number of the station.</param>
/// <param name="Status">Status.</param>
/// <param name="Label">Chainage with unit where there is room; else empty.</param>
/// <param name="LabelAt">Middle of the label, beside margin B.</param>
/// <param name="AcrossGridDeg">Azimuth across the dike from grid north, toward B [deg].</param>
public sealed record MapStation(Point2 At, int Dike, int Number, StationStatus Status, string Label, Point2 LabelAt, double AcrossGridDeg);
