using CloudStruct.Maths.Directions;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Decisions;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Sets;
using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Sets;

/// <summary>The sets of one domain: in the whole survey, and the same sets again in every zone.</summary>
/// <param name="Sets">Of the whole survey.</param>
/// <param name="Zoned">The same sets where a zone has enough planes of them.</param>
/// <param name="Means">Their means for the tests of common means.</param>
/// <param name="Decided">What became of decisions about them.</param>
internal sealed record DomainSets(OrientationSet[] Sets, OrientationSet[] Zoned, MeanToCompare[] Means, IReadOnlyList<DecisionOutcome> Decided)
{
    // In a zone a set may lie off its mean in the whole survey; farther than this it is another one.
    private const double FarthestInZoneDeg = 20;

    /// <summary>Finds them; names of sets go into the list of faces.</summary>
    public static DomainSets Of(
        SetsInput input, SetSettings settings, StageContext context, SetGroup group, int[] members, string[] setOfFace)
    {
        Face[] faces = input.Faces.Faces;
        JointPlane[] joined = JointPlanes.Of(faces, members, input.Faces.NoiseM, settings.ReachM);
        var seen = SeenRock.Of(input, members, null);
        var planes = new DomainPlanes(
            group,
            joined,
            [.. joined.Select(p => p.Normal)],
            PlaneWeights.Of(joined, settings.Weighting, seen.Surface),
            JointPlanes.Groups(faces, joined, input.Faces.NoiseM, settings.ReachM));
        var rules = new ClusterRules(settings.MostSets, settings.FewestPlanes, settings.ValleyDepth, settings.WidestDeg);
        AxisClusters clusters = AxisClusters.Find(planes.Poles, planes.Weights, rules, context.Seed, context.Stop);
        SetRemarks.Say(context, group.Said, clusters, joined.Length, members.Length, settings, group.Domain);
        var decisions = new SetDecisions(planes, clusters, context.Stop);
        clusters = decisions.Apply(input.Decisions, input.Frame);
        if (clusters.Count == 0) return new DomainSets([], [], [], decisions.Outcomes);

        // Numbered in order of exposed area.
        int[] byArea = [.. Enumerable.Range(0, clusters.Count)
            .OrderByDescending(c => joined.Where((_, i) => clusters.ClusterOf[i] == c).Sum(p => p.AreaM2)).ThenBy(c => c)];
        (OrientationSet Set, SetMean Mean)?[] found = Measure(input, settings, planes, clusters.Mixture, clusters.ClusterOf, byArea, seen, "");
        for (int s = 0; s < byArea.Length; s++)
        {
            for (int i = 0; i < joined.Length; i++)
            {
                if (clusters.ClusterOf[i] == byArea[s]) foreach (int face in joined[i].Faces) setOfFace[face] = found[s]!.Value.Set.Set;
            }
        }

        double[] stability = SetStability.Of(
            planes,
            [.. joined.Select(p => faces[p.Faces.MaxBy(f => faces[f].AreaM2)].Middle)],
            [.. found.Select(f => f!.Value.Mean.Mean)],
            [.. found.Select(f => f!.Value.Mean.Region.Cone95Deg)],
            rules,
            context.Seed,
            context.Threads,
            context.Stop);
        OrientationSet[] sets = [.. found.Select((f, s) => f!.Value.Set with { Stability = stability[s], Decided = decisions.Decided[byArea[s]] })];
        List<MeanToCompare> means = [.. found.Select(f => ToCompare(f!.Value, group.Said, ""))];
        List<OrientationSet> zoned = [];
        foreach (Zone zone in input.Zones)
        {
            context.Stop.ThrowIfCancellationRequested();
            foreach ((OrientationSet Set, SetMean Mean)? f in InZone(input, settings, planes, clusters.Mixture, byArea, members, zone, context.Stop))
            {
                if (f is null) continue;
                zoned.Add(f.Value.Set);
                means.Add(ToCompare(f.Value, group.Said, zone.Name));
            }
        }

        return new DomainSets(sets, [.. zoned], [.. means], decisions.Outcomes);
    }

    private static MeanToCompare ToCompare((OrientationSet Set, SetMean Mean) f, string kind, string zone)
    {
        Eigen3 v = f.Mean.Variance.Eigen();
        return new MeanToCompare(f.Set.Set, kind, zone, f.Mean.Mean, (v.L1 + v.L2) / 2, f.Mean.Groups);
    }

    /// <summary>The sets of the whole survey fitted again to the planes of a zone; null where there are too few.</summary>
    private static (OrientationSet Set, SetMean Mean)?[] InZone(
        SetsInput input, SetSettings settings, DomainPlanes planes, AxisMixture mixture, int[] byArea, int[] members, Zone zone, CancellationToken stop)
    {
        Face[] faces = input.Faces.Faces;
        int[] inside = [.. Enumerable.Range(0, planes.Planes.Length)
            .Where(i => ZonePlaces.Holds(zone, input.Frame.ToMap(faces[planes.Planes[i].Faces.MaxBy(f => faces[f].AreaM2)].Middle)))];
        DomainPlanes own = planes.Only(inside);
        (OrientationSet Set, SetMean Mean)?[] none = new (OrientationSet, SetMean)?[byArea.Length];
        if (own.Poles.Length < settings.FewestPlanes) return none;
        double[] scaled = AxisClusters.Scaled(own.Weights);

        // Components of which the zone has too little would die in the fit: they are left out before.
        int[] of = Nearest(mixture, own.Poles);
        int[] kept = [.. Enumerable.Range(0, mixture.Components.Length).Where(c => of.Count(o => o == c) >= settings.FewestPlanes)];
        if (kept.Length == 0) return none;
        AxisMixture start = mixture with { Components = [.. kept.Select(c => mixture.Components[c])] };
        if (start.Fit(own.Poles, scaled, stop) is not { } here) return none;
        of = Nearest(here, own.Poles);
        int[] order = [.. byArea.Select(c => Array.IndexOf(kept, c)).Select(k =>
            k >= 0 && of.Count(o => o == k) >= settings.FewestPlanes
            && Math.Abs(here.Components[k].Mean.Dot(start.Components[k].Mean)) > Math.Cos(FarthestInZoneDeg * Math.PI / 180) ? k : -1)];
        return Measure(input, settings, own, here, of, order, SeenRock.Of(input, members, zone), zone.Name);
    }

    private static int[] Nearest(AxisMixture mixture, Vec3[] poles)
    {
        double[] share = new double[mixture.Components.Length + 1];
        int[] of = new int[poles.Length];
        for (int i = 0; i < poles.Length; i++)
        {
            mixture.Shares(poles[i], share);
            int best = Enumerable.Range(0, share.Length).MaxBy(c => share[c]);
            of[i] = best == share.Length - 1 ? -1 : best;
        }

        return of;
    }

    /// <summary>Statistics of the components in the order given; null for those numbered -1.</summary>
    private static (OrientationSet Set, SetMean Mean)?[] Measure(
        SetsInput input, SetSettings settings, DomainPlanes planes, AxisMixture mixture, int[] componentOf, int[] order, SeenRock seen, string zone)
    {
        (Symmetric3 Covariance, double Groups)[] regions = MixtureMeans.Of(mixture, planes.Poles, planes.Weights, planes.Groups);
        double[][] shares = SharesOf(mixture, planes);
        double? blind = seen.Surface.BlindShare();
        var result = new (OrientationSet, SetMean)?[order.Length];
        for (int s = 0; s < order.Length; s++)
        {
            int c = order[s];
            if (c < 0) continue;
            SetMean mean = SetMean.Of(mixture.Components[c], planes.Poles, shares[c], regions[c].Covariance, regions[c].Groups, input.Frame.Reference);
            JointPlane[] own = [.. planes.Planes.Where((_, i) => componentOf[i] == c)];
            OrientationSet set = SetRow.Of(input, settings, planes.Group, planes.Group.Numbered + s + 1, own, mean, seen);
            result[s] = (set with { BlindShare = blind, Zone = zone }, mean);
        }

        return result;
    }

    /// <summary>Per component: weight of every plane times its share in the component.</summary>
    private static double[][] SharesOf(AxisMixture mixture, DomainPlanes planes)
    {
        int k = mixture.Components.Length;
        double[][] result = [.. Enumerable.Range(0, k).Select(_ => new double[planes.Poles.Length])];
        double[] share = new double[k + 1];
        for (int i = 0; i < planes.Poles.Length; i++)
        {
            mixture.Shares(planes.Poles[i], share);
            for (int c = 0; c < k; c++) result[c][i] = planes.Weights[i] * share[c];
        }

        return result;
    }
}
