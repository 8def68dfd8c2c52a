using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Contacts;

/// <summary>A short piece of a margin: the mean of the class changes in one cell of its trace, or of the points of a face that
/// lies on the contact.</summary>
/// <param name="Margin">Side.</param>
/// <param name="Place">Mean place, local [m].</param>
/// <param name="At">The same in the coordinates of the sheet.</param>
/// <param name="Weight">Sum of the edges' weights.</param>
/// <param name="Surface">Whether it lies on an exposed contact surface.</param>
internal readonly record struct TraceCell(Margin Margin, Vec3 Place, SheetPoint At, double Weight, bool Surface = false);
