using CloudStruct.Records.Contacts;
using CloudStruct.Records.Decisions;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using static System.FormattableString;

namespace CloudStruct.Stages.Decisions;

/// <summary>Faces after what a geologist decided about them: before contacts and sets, so that a dropped face takes part in nothing.</summary>
/// <param name="Faces">Without the dropped ones, in the same order.</param>
/// <param name="Domains">Domain decided by hand per face; null where nothing was. Empty without decisions.</param>
/// <param name="Outcomes">One per decision about a face, in their order.</param>
public sealed record DecidedFaces(FaceSet Faces, FaceDomain?[] Domains, DecisionOutcome[] Outcomes)
{
    /// <summary>Applies them. Of two rows about the domain of one face the later one counts.</summary>
    /// <param name="faces">All faces.</param>
    /// <param name="decisions">All decisions; those about other things are passed over.</param>
    /// <param name="frame">Of the survey.</param>
    public static DecidedFaces Of(FaceSet faces, IReadOnlyList<Decision> decisions, SurveyFrame frame)
    {
        Decision[] own = [.. decisions.Where(d => d.Target == DecisionTarget.Face)];
        if (own.Length == 0) return new DecidedFaces(faces, [], []);
        int[] face = [.. own.Select(d => FaceMatch.Find(d, faces, frame))];
        var dropped = new HashSet<int>(own.Zip(face).Where(p => p.First.Action == DecisionAction.Drop && p.Second >= 0).Select(p => p.Second));
        var domain = new FaceDomain?[faces.Faces.Length];
        var outcomes = new DecisionOutcome[own.Length];
        for (int i = own.Length - 1; i >= 0; i--)
        {
            int f = face[i];
            if (f < 0)
            {
                outcomes[i] = new DecisionOutcome(own[i], false, 0, "no face of this place and attitude was found");
                continue;
            }

            int id = faces.Faces[f].FaceId;
            if (own[i].Action == DecisionAction.Drop)
            {
                outcomes[i] = new DecisionOutcome(own[i], true, id, "dropped");
            }
            else if (dropped.Contains(f))
            {
                outcomes[i] = new DecisionOutcome(own[i], false, id, "another row drops this face");
            }
            else if (own[i].Action == DecisionAction.Note)
            {
                outcomes[i] = new DecisionOutcome(own[i], true, id, "noted");
            }
            else if (domain[f] is not null)
            {
                outcomes[i] = new DecisionOutcome(own[i], false, id, "a later row names another domain");
            }
            else
            {
                domain[f] = own[i].Domain;
                outcomes[i] = new DecisionOutcome(own[i], true, id, Invariant($"moved to {own[i].Domain.ToString().ToLowerInvariant()}"));
            }
        }

        int[] kept = [.. Enumerable.Range(0, faces.Faces.Length).Where(f => !dropped.Contains(f))];
        return new DecidedFaces(Without(faces, kept), [.. kept.Select(f => domain[f])], outcomes);
    }

    private static FaceSet Without(FaceSet faces, int[] kept)
    {
        if (kept.Length == faces.Faces.Length) return faces;
        int[] number = new int[faces.Faces.Length + 1];
        for (int k = 0; k < kept.Length; k++) number[kept[k] + 1] = k + 1;
        return faces with { Faces = [.. kept.Select(f => faces.Faces[f])], FaceOfPoint = Array.ConvertAll(faces.FaceOfPoint, f => number[f]) };
    }
}
