using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Width;

/// <summary>One vertex of a margin's trace.</summary>
/// <param name="Margin">Side.</param>
/// <param name="Place">Local [m].</param>
/// <param name="ChainageM">Chainage [m].</param>
internal readonly record struct TraceVertex(Margin Margin, Vec3 Place, double ChainageM);
