namespace CloudStruct.Stages.Contacts;

/// <summary>A place in the coordinates of a <see cref="Sheet"/>.</summary>
/// <param name="S">Along strike [m].</param>
/// <param name="Q">Along the reference normal, from A to B [m].</param>
/// <param name="T">Up dip [m].</param>
internal readonly record struct SheetPoint(double S, double Q, double T);
