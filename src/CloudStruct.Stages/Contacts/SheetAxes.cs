using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Contacts;

/// <summary>Origin and unit axes of a <see cref="Sheet"/> at one place along strike.</summary>
/// <param name="Origin">On the level reference line, local [m].</param>
/// <param name="Along">Level, along strike.</param>
/// <param name="Normal">From A to B.</param>
/// <param name="Up">Up dip, in the sheet.</param>
internal readonly record struct SheetAxes(Vec3 Origin, Vec3 Along, Vec3 Normal, Vec3 Up);
