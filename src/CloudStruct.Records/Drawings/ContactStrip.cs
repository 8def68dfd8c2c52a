using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Drawings;

/// <summary>A stretch of contact as a strip through its trace, for views in three dimensions.</summary>
/// <param name="Contact">Place in the list of contacts, from 0.</param>
/// <param name="Dike">Number of the dike.</param>
/// <param name="Margin">Side.</param>
/// <param name="Constraint">Plane: the strip runs down dip from the trace. Line: nothing gives a dip, the strip is a narrow
/// level ribbon on the trace.</param>
/// <param name="Upper">One edge, local [m], in order of chainage.</param>
/// <param name="Lower">The other edge, as many vertices.</param>
public sealed record ContactStrip(int Contact, int Dike, Margin Margin, Constraint Constraint, Vec3[] Upper, Vec3[] Lower);
