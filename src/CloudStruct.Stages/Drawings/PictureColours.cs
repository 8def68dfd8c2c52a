using CloudStruct.Records.Classes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Sets;

namespace CloudStruct.Stages.Drawings;

/// <summary>Colours of classes and sets, told apart with any colour vision.</summary>
/// <remarks>Okabe and Ito 2008, Color Universal Design. Sets are numbered in the same order of colours as on the nets.</remarks>
internal static class PictureColours
{
    /// <summary>What has no colour of its own.</summary>
    public static readonly (byte R, byte G, byte B) Grey = (176, 176, 176);

    private static readonly (byte R, byte G, byte B)[] Sets =
    [
        (0x00, 0x72, 0xB2), (0xD5, 0x5E, 0x00), (0x00, 0x9E, 0x73), (0xE6, 0x9F, 0x00), (0xCC, 0x79, 0xA7), (0x56, 0xB4, 0xE9), (0x30, 0x30, 0x30),
    ];

    /// <summary>Colour of a class.</summary>
    public static (byte R, byte G, byte B) Of(RockClass rock) => rock switch
    {
        RockClass.Host => (0x56, 0xB4, 0xE9),
        RockClass.Dike => (0xD5, 0x5E, 0x00),
        RockClass.Cover => (0x00, 0x9E, 0x73),
        RockClass.Inclusion => (0xCC, 0x79, 0xA7),
        RockClass.Loose => (0xF0, 0xE4, 0x42),
        _ => Grey,
    };

    /// <summary>Colour of each set: the hue by its number within its domain, as on the nets; darker in the dike, paler on
    /// contacts.</summary>
    public static Dictionary<string, (byte R, byte G, byte B)> OfSets(OrientationSet[] sets)
    {
        var colours = new Dictionary<string, (byte R, byte G, byte B)>(StringComparer.Ordinal);
        foreach (IGrouping<FaceDomain, OrientationSet> domain in sets.Where(s => s.Zone == "").GroupBy(s => s.Domain))
        {
            int n = 0;
            foreach (OrientationSet s in domain)
            {
                (byte r, byte g, byte b) = Sets[n++ % Sets.Length];
                colours[s.Set] = domain.Key switch
                {
                    FaceDomain.Dike => (Mix(r, 0, 0.45), Mix(g, 0, 0.45), Mix(b, 0, 0.45)),
                    FaceDomain.Margin => (Mix(r, 255, 0.5), Mix(g, 255, 0.5), Mix(b, 255, 0.5)),
                    _ => (r, g, b),
                };
            }
        }

        return colours;
    }

    /// <summary>An entry of the key.</summary>
    public static ViewKey Key((byte R, byte G, byte B) c, string label) => new(c.R, c.G, c.B, label);

    private static byte Mix(byte own, byte other, double share) => (byte)Math.Round((own * (1 - share)) + (other * share));
}
