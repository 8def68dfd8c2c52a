using CloudStruct.Records.Contacts;
using CloudStruct.Records.Decisions;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Sets;
using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Sets;

/// <summary>Groups faces of like attitude into sets, domain by domain and zone by zone, gives their statistics, and tests which
/// means may be one.</summary>
/// <remarks>Faces that are not in place or whose domain is unknown stay out. Exposed contact surfaces (domain margin) make a set
/// of their own only where there are enough separate ones; a contact is not a joint.</remarks>
public sealed class SetsStage : IStage<SetsInput, SetSettings, SetsRecord>
{
    /// <inheritdoc/>
    public string Name => "sets";

    /// <inheritdoc/>
    public SetsRecord Run(SetsInput input, SetSettings settings, StageContext context)
    {
        Face[] faces = input.Faces.Faces;
        FaceDomain[] domain = Domains(input);
        string[] setOfFace = new string[faces.Length];
        Array.Fill(setOfFace, "");
        List<OrientationSet> sets = [], zoned = [];
        var decided = new Dictionary<int, DecisionOutcome>();
        foreach (Decision d in input.Decisions.Where(d => d.Target == DecisionTarget.Set))
        {
            decided[d.Line] = new DecisionOutcome(d, false, 0, "no set of this domain was found");
        }

        List<MeanToCompare> means = ContactMeans.Of(input.Contacts);
        FaceDomain[] order = [FaceDomain.Host, FaceDomain.Dike, FaceDomain.Margin];
        for (int d = 0; d < order.Length; d++)
        {
            context.Stop.ThrowIfCancellationRequested();
            int numbered = 0;
            foreach ((int dike, int[] members) in Groups(input.Contacts, order[d], domain))
            {
                var found = DomainSets.Of(input, settings, context, new SetGroup(order[d], dike, numbered), members, setOfFace);
                numbered += found.Sets.Length;
                sets.AddRange(found.Sets);
                zoned.AddRange(found.Zoned);
                means.AddRange(found.Means);
                // What one dike did not fit may fit the next.
                foreach (DecisionOutcome o in found.Decided) if (numbered == found.Sets.Length || o.Applied) decided[o.Decision.Line] = o;
            }

            context.Progress((d + 1.0) / order.Length);
        }

        int outside = domain.Count(d => d == FaceDomain.Unknown);
        if (outside > 0)
        {
            context.Say(new Remark("sets", Invariant($"{outside} of {faces.Length} {(faces.Length == 1 ? "face" : "faces")} took no part: not in place, or of no known domain."), false));
        }

        string[] zones = [.. input.Zones.Select(z => z.Name)];
        return new SetsRecord
        {
            Sets = [.. sets, .. zoned.OrderBy(s => Array.IndexOf(zones, s.Zone))],
            SetOfFace = setOfFace,
            CommonMeans = CommonMeans.Of(means, zones),
            Decided = [.. decided.OrderBy(d => d.Key).Select(d => d.Value)],
        };
    }

    // Faces of a domain; of the dikes each by itself where there are several: they cooled by themselves, and two sets of two dikes
    // some degrees apart would be taken for one that lies between them.
    private static IEnumerable<(int Dike, int[] Members)> Groups(ContactsRecord contacts, FaceDomain which, FaceDomain[] domain)
    {
        int[] members = [.. Enumerable.Range(0, domain.Length).Where(i => domain[i] == which)];
        if (members.Length == 0) return [];
        int[] dike = contacts.DikeOfFace;
        if (which != FaceDomain.Dike || dike.Length != domain.Length || members.Select(i => dike[i]).Distinct().Count() < 2) return [(0, members)];
        return members.GroupBy(i => dike[i]).OrderBy(g => g.Key).Select(g => (g.Key, g.ToArray()));
    }

    /// <summary>Domain of every face; Unknown for those that stay out.</summary>
    private static FaceDomain[] Domains(SetsInput input)
    {
        Face[] faces = input.Faces.Faces;
        FaceDomain[] told = input.Contacts.DomainOfFace;
        InPlace[] place = input.Contacts.InPlaceOfFace;
        var domain = new FaceDomain[faces.Length];
        for (int i = 0; i < faces.Length; i++)
        {
            bool loose = (place.Length == faces.Length ? place[i] : faces[i].InPlace) == InPlace.No;
            domain[i] = loose ? FaceDomain.Unknown : told.Length == faces.Length ? told[i] : FaceDomain.Host;
        }

        return domain;
    }
}
