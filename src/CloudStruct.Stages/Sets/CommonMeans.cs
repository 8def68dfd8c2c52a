using CloudStruct.Maths.Directions;
using CloudStruct.Records.Sets;
using static System.FormattableString;

namespace CloudStruct.Stages.Sets;

/// <summary>Tests which means may be one: contacts and sets, sets of different domains, one set in different zones.</summary>
/// <remarks>Common errors of the model turn both means alike and are left out. Pairs farther apart than
/// <see cref="FarthestDeg"/> are not listed: nobody takes them for one.</remarks>
internal static class CommonMeans
{
    /// <summary>Pairs farther apart are left out [deg].</summary>
    public const double FarthestDeg = 30;

    private const double TellsApartDeg = 10;

    /// <summary>All tests, whole survey first.</summary>
    /// <param name="means">Means, whole survey and zones.</param>
    /// <param name="zones">Names of the zones in their order.</param>
    public static CommonMean[] Of(List<MeanToCompare> means, string[] zones)
    {
        var rows = new List<CommonMean>();
        foreach (string zone in zones.Prepend(""))
        {
            // Contacts have no zone of their own: they are held against the sets of every zone.
            MeanToCompare[] here = [.. means.Where(m => m.Zone == zone || m.Kind == "contact")];
            for (int a = 0; a < here.Length; a++)
            {
                for (int b = a + 1; b < here.Length; b++)
                {
                    if (here[a].Kind == here[b].Kind && (here[a].Kind != "contact" || zone.Length > 0)) continue;
                    if (Test(here[a], here[b], here[a].Name, here[b].Name, zone) is { } row) rows.Add(row);
                }
            }
        }

        MeanToCompare[] zoned = [.. means.Where(m => m.Zone.Length > 0)];
        for (int a = 0; a < zoned.Length; a++)
        {
            for (int b = a + 1; b < zoned.Length; b++)
            {
                if (zoned[a].Name != zoned[b].Name) continue;
                string first = Invariant($"{zoned[a].Name} in {zoned[a].Zone}"), second = Invariant($"{zoned[b].Name} in {zoned[b].Zone}");
                if (Test(zoned[a], zoned[b], first, second, "") is { } row) rows.Add(row);
            }
        }

        return [.. rows];
    }

    private static CommonMean? Test(MeanToCompare a, MeanToCompare b, string first, string second, string zone)
    {
        if (!(a.VarianceRad2 > 0 && b.VarianceRad2 > 0 && a.N > 1.5 && b.N > 1.5)) return null;
        var t = CommonMeanTest.Of(a.Axis, a.VarianceRad2, a.N, b.Axis, b.VarianceRad2, b.N);
        if (t.AngleDeg > FarthestDeg) return null;
        MeansVerdict verdict = t.P < 0.05 ? MeansVerdict.Apart : t.CriticalDeg <= TellsApartDeg ? MeansVerdict.Alike : MeansVerdict.Undecided;
        return new CommonMean(first, second, zone, t.AngleDeg, t.V, t.P, a.N, b.N, verdict);
    }
}
