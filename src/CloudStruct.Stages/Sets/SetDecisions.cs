using CloudStruct.Maths.Directions;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Decisions;
using CloudStruct.Records.Frame;
using static System.FormattableString;

namespace CloudStruct.Stages.Sets;

/// <summary>Joins and splits the clusters of one domain as a geologist decided.</summary>
/// <remarks>Sets are known again by their mean attitude, not by their names, which follow exposed area. The decision fixes which
/// planes are in a set; its law is fitted to all planes from there, like that of any other set, unless the fit runs away from
/// them.</remarks>
internal sealed class SetDecisions(DomainPlanes planes, AxisClusters found, CancellationToken stop)
{
    // Two flights of one outcrop move a mean by its cone, a few degrees; two sets lie farther apart.
    private const double FarthestDeg = 15;
    private const double RunawayDeg = 10;
    private const double NarrowestDeg = 1.5;
    private const int FewestInPart = 2;
    private readonly int[] clusterOf = [.. found.ClusterOf];
    private readonly List<AxisComponent> sets = [.. found.Mixture.Components.Take(found.Count)];
    private readonly AxisComponent[] others = [.. found.Mixture.Components.Skip(found.Count)];
    private readonly List<string> words = [.. Enumerable.Repeat("", found.Count)];

    /// <summary>What was decided about each cluster: "joined", "split", "note"; empty when nothing.</summary>
    public IReadOnlyList<string> Decided => words;

    /// <summary>What became of each decision.</summary>
    public List<DecisionOutcome> Outcomes { get; } = [];

    /// <summary>The clusters after all decisions about this domain, applied in their order.</summary>
    /// <param name="decisions">All decisions.</param>
    /// <param name="frame">North of the azimuths.</param>
    public AxisClusters Apply(IReadOnlyList<Decision> decisions, SurveyFrame frame)
    {
        Decision[] own = [.. decisions.Where(d => d.Target == DecisionTarget.Set && d.Domain == planes.Group.Domain)];
        if (own.Length == 0) return found;
        foreach (Decision d in own)
        {
            (bool applied, string text) = Apply(d, frame);
            Outcomes.Add(new DecisionOutcome(d, applied, 0, text));
        }

        if (words.All(w => w is "" or "note")) return found;
        double[] scaled = AxisClusters.Scaled(planes.Weights);
        AxisMixture start = found.Mixture with { Components = [.. sets, .. others] };
        AxisMixture? fit = start.Fit(planes.Poles, scaled, stop);
        bool ranAway = fit is null || fit.Components.Zip(start.Components).Take(sets.Count).Any(p => Deg(p.First.Mean, p.Second.Mean) > RunawayDeg);
        return found with { ClusterOf = clusterOf, Count = sets.Count, Mixture = ranAway ? start : fit! };
    }

    private (bool Applied, string Text) Apply(Decision d, SurveyFrame frame)
    {
        double turn = d.TurnDeg(frame);
        Vec3 first = d.Attitude!.Value.UpwardNormal(turn);
        if (d.Action == DecisionAction.Note)
        {
            int s = Nearest(first);
            if (s < 0) return (false, "no set of this mean attitude was found");
            if (words[s].Length == 0) words[s] = "note";
            return (true, "noted");
        }

        Vec3 second = d.Other!.Value.UpwardNormal(turn);
        return d.Action == DecisionAction.JoinSets ? Join(first, second) : Split(first, second);
    }

    private (bool Applied, string Text) Join(Vec3 first, Vec3 second)
    {
        int a = Nearest(first), b = Nearest(second);
        if (a < 0 || b < 0) return (false, "no set of " + (a < 0 ? "the first" : "the second") + " mean attitude was found");
        if (a == b) return (false, "both mean attitudes now belong to one set");
        (a, b) = (Math.Min(a, b), Math.Max(a, b));
        for (int i = 0; i < clusterOf.Length; i++) clusterOf[i] = clusterOf[i] == b ? a : clusterOf[i] > b ? clusterOf[i] - 1 : clusterOf[i];
        sets[a] = Law(a, sets[a].Share + sets[b].Share);
        sets.RemoveAt(b);
        words.RemoveAt(b);
        words[a] = "joined";
        return (true, "joined");
    }

    private (bool Applied, string Text) Split(Vec3 first, Vec3 second)
    {
        int set = Enumerable.Range(0, sets.Count).Where(s => Deg(sets[s].Mean, first) <= 3 * FarthestDeg && Deg(sets[s].Mean, second) <= 3 * FarthestDeg)
            .OrderByDescending(s => sets[s].LogDensity(first) + sets[s].LogDensity(second)).FirstOrDefault(-1);
        if (set < 0) return (false, "no set holds both attitudes");
        if (Nearest(first) is >= 0 and var a && Nearest(second) is >= 0 and var b && a != b) return (false, "the two attitudes already belong to two sets");
        int[] own = [.. Enumerable.Range(0, clusterOf.Length).Where(i => clusterOf[i] == set)];
        int[] part = [.. own.Where(i => Deg(planes.Poles[i], second) < Deg(planes.Poles[i], first))];
        if (part.Length < FewestInPart || own.Length - part.Length < FewestInPart) return (false, Invariant($"one part would have fewer than {FewestInPart} planes"));
        double share = sets[set].Share, moved = part.Sum(i => planes.Weights[i]) / own.Sum(i => planes.Weights[i]);
        foreach (int i in part) clusterOf[i] = sets.Count;
        sets[set] = Law(set, share * (1 - moved));
        sets.Add(Law(sets.Count, share * moved));
        words[set] = "split";
        words.Add("split");
        return (true, Invariant($"split into {own.Length - part.Length} and {part.Length} planes"));
    }

    /// <summary>The law of the planes that are in a cluster.</summary>
    private AxisComponent Law(int cluster, double share)
    {
        Symmetric3 sum = default;
        double weight = 0;
        for (int i = 0; i < clusterOf.Length; i++)
        {
            if (clusterOf[i] != cluster) continue;
            sum += Symmetric3.Outer(planes.Poles[i], planes.Weights[i]);
            weight += planes.Weights[i];
        }

        return AxisComponent.FromTensor(share, (sum * (1 / weight)).Eigen(), false, NarrowestDeg);
    }

    private int Nearest(Vec3 normal)
    {
        int best = Enumerable.Range(0, sets.Count).OrderBy(s => Deg(sets[s].Mean, normal)).FirstOrDefault(-1);
        return best >= 0 && Deg(sets[best].Mean, normal) <= FarthestDeg ? best : -1;
    }

    private static double Deg(Vec3 a, Vec3 b) => Math.Acos(Math.Min(1, Math.Abs(a.Dot(b)))) * 180 / Math.PI;
}
