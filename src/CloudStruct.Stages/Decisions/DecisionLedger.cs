using CloudStruct.Records.Contacts;
using CloudStruct.Records.Decisions;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Sets;
using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Decisions;

/// <summary>Gathers what became of every decision, in the order of the file.</summary>
public static class DecisionLedger
{
    private const int MostNamed = 12;
    private const string Stage = "decisions";

    /// <summary>The record, and remarks about what could not be applied.</summary>
    /// <param name="decisions">All decisions.</param>
    /// <param name="faces">Outcomes about faces.</param>
    /// <param name="contacts">Outcomes about contacts.</param>
    /// <param name="final">The faces that are reported.</param>
    /// <param name="sets">Sets with their outcomes.</param>
    /// <param name="say">Takes remarks.</param>
    public static DecisionsRecord Of(
        IReadOnlyList<Decision> decisions, DecisionOutcome[] faces, DecisionOutcome[] contacts, FaceSet final, SetsRecord sets, Action<Remark> say)
    {
        if (decisions.Count == 0) return new DecisionsRecord();
        var there = new HashSet<int>(final.Faces.Select(f => f.FaceId));
        Dictionary<int, DecisionOutcome> byLine = faces.Concat(contacts).Concat(sets.Decided).ToDictionary(o => o.Decision.Line);
        var outcomes = new DecisionOutcome[decisions.Count];
        var words = new Dictionary<int, string>();
        for (int i = 0; i < outcomes.Length; i++)
        {
            Decision d = decisions[i];
            DecisionOutcome o = byLine.TryGetValue(d.Line, out DecisionOutcome? known) ? known : new DecisionOutcome(d, true, 0, "noted");
            if (o is { Applied: true, FaceId: > 0 } && d.Action != DecisionAction.Drop)
            {
                if (!there.Contains(o.FaceId)) o = o with { Applied = false, Found = "the face lies on cover and is not reported" };
                else Add(words, o.FaceId, d.Action == DecisionAction.Domain ? "domain" : "note");
            }

            outcomes[i] = o;
        }

        var decided = new HashSet<string>(sets.Sets.Where(s => s.Decided.Length > 0).Select(s => s.Set), StringComparer.Ordinal);
        for (int f = 0; f < final.Faces.Length && f < sets.SetOfFace.Length; f++)
        {
            if (decided.Contains(sets.SetOfFace[f])) Add(words, final.Faces[f].FaceId, "set");
        }

        Speak(outcomes, say);
        return new DecisionsRecord { Outcomes = outcomes, OfFace = words };
    }

    private static void Add(Dictionary<int, string> words, int face, string word)
    {
        string now = words.GetValueOrDefault(face, "");
        if (!now.Split(' ').Contains(word)) words[face] = (now + " " + word).Trim();
    }

    private static void Speak(DecisionOutcome[] outcomes, Action<Remark> say)
    {
        DecisionOutcome[] left = [.. outcomes.Where(o => !o.Applied)];
        say(new Remark(Stage, Invariant($"{outcomes.Length - left.Length} of {outcomes.Length} decisions by hand were applied."), false));
        foreach (DecisionOutcome o in left.Take(MostNamed)) say(new Remark(Stage, Invariant($"decisions.csv, line {o.Decision.Line}: {Words(o.Decision)} was not applied: {o.Found}."), true));
        if (left.Length > MostNamed) say(new Remark(Stage, Invariant($"{left.Length - MostNamed} more decisions were not applied; tables/decisions.csv lists them all."), true));
    }

    private static string Words(Decision d) => d.Action switch
    {
        DecisionAction.Drop => Invariant($"dropping face {d.FaceId}"),
        DecisionAction.Domain => Invariant($"moving face {d.FaceId} to {d.Domain.ToString().ToLowerInvariant()}"),
        DecisionAction.JoinSets => $"joining {d.Set} and {d.OtherSet}",
        DecisionAction.SplitSet => $"splitting {d.Set}",
        DecisionAction.ConfirmContact => Invariant($"confirming a contact of dike {d.Dike}, margin {d.Margin}"),
        _ => $"the note \"{d.Note}\"",
    };
}
