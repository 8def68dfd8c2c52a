using CloudStruct.Maths.Directions;
using CloudStruct.Records.Drawings;

namespace CloudStruct.Stages.Drawings;

/// <summary>Nets in the projection that the recipe asks for.</summary>
internal static class NetForms
{
    /// <summary>A net laid out by equal area, in the form wanted: places move along their azimuth, nothing else changes.</summary>
    public static NetDrawing In(NetForm form, NetDrawing net) => form == NetForm.EqualArea ? net : net with
    {
        Poles = [.. net.Poles.Select(p => p with { At = EqualAngleNet.OfEqualArea(p.At) })],
        Curves = [.. net.Curves.Select(c => c with { Points = [.. c.Points.Select(EqualAngleNet.OfEqualArea)] })],
        Sentence = net.Sentence.Replace("Equal area, lower hemisphere", "Equal angle, lower hemisphere", StringComparison.Ordinal),
    };

    /// <summary>All nets of a sheet.</summary>
    public static NetSheet In(NetForm form, NetSheet sheet) => form == NetForm.EqualArea ? sheet : sheet with
    {
        Nets = [.. sheet.Nets.Select(n => In(form, n))],
        Sentence = sheet.Sentence.Replace("Equal area, lower hemisphere", "Equal angle, lower hemisphere", StringComparison.Ordinal),
    };
}
