using CloudStruct.Records.Contacts;
using CloudStruct.Records.Decisions;
using CloudStruct.Records.Frame;
using static System.FormattableString;

namespace CloudStruct.Stages.Decisions;

/// <summary>Contacts that a geologist confirmed or noted something about.</summary>
public static class DecidedContacts
{
    private const double FarthestDeg = 15;
    private const double LeastReachM = 1;

    /// <summary>The contacts with their rows marked; nothing measured changes.</summary>
    /// <param name="contacts">Rows found.</param>
    /// <param name="decisions">All decisions; those about other things are passed over.</param>
    /// <param name="frame">Of the survey.</param>
    /// <param name="outcomes">One per decision about a contact, in their order.</param>
    public static ContactsRecord Of(ContactsRecord contacts, IReadOnlyList<Decision> decisions, SurveyFrame frame, out DecisionOutcome[] outcomes)
    {
        var result = new List<DecisionOutcome>();
        Contact[] rows = [.. contacts.Contacts];
        foreach (Decision d in decisions.Where(d => d.Target == DecisionTarget.Contact))
        {
            int r = Find(d, rows, frame);
            string word = d.Action == DecisionAction.ConfirmContact ? "confirmed" : "note";
            if (r >= 0 && !rows[r].Decided.Split(' ').Contains(word)) rows[r] = rows[r] with { Decided = (rows[r].Decided + " " + word).Trim() };
            result.Add(r < 0
                ? new DecisionOutcome(d, false, 0, "no contact of this place and attitude was found")
                : new DecisionOutcome(d, true, 0, Invariant($"{(word == "note" ? "noted" : word)}: dike {rows[r].Dike}, margin {rows[r].Margin}, segment {rows[r].Segment}")));
        }

        outcomes = [.. result];
        return result.Count == 0 ? contacts : contacts with { Contacts = rows };
    }

    private static int Find(Decision d, Contact[] rows, SurveyFrame frame)
    {
        Vec3 place = d.Place!.Value - frame.Origin;
        Vec3? normal = d.Attitude?.UpwardNormal(d.TurnDeg(frame));
        double best = double.PositiveInfinity;
        int found = -1;
        for (int r = 0; r < rows.Length; r++)
        {
            if (d.Margin is { } margin && rows[r].Margin != margin) continue;
            double reach = Math.Max(LeastReachM, rows[r].WindowM / 2), away = (place - rows[r].Middle).Length, deg = 0;
            if (normal is { } n && rows[r].Normal is { } own) deg = Math.Acos(Math.Min(1, Math.Abs(n.Dot(own)))) * 180 / Math.PI;
            if (away > reach || deg > FarthestDeg) continue;
            double score = (away / reach) + (deg / FarthestDeg);
            if (score < best) (best, found) = (score, r);
        }

        return found;
    }
}
