using CloudStruct.Maths.Directions;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Sets;
using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Sets;

/// <summary>Groups faces of like attitude into sets, domain by domain, and gives their statistics.</summary>
/// <remarks>Faces that are not in place or whose domain is unknown stay out. Exposed contact surfaces (domain margin) make a set
/// of their own only where there are enough separate ones; a contact is not a joint.</remarks>
public sealed class SetsStage : IStage<SetsInput, SetSettings, SetsRecord>
{
    // Beyond a gap of ten in BIC the runner-up has no case (Kass and Raftery 1995, J. Am. Stat. Assoc. 90, 773-795).
    private const double CertainGap = 10;

    /// <inheritdoc/>
    public string Name => "sets";

    /// <inheritdoc/>
    public SetsRecord Run(SetsInput input, SetSettings settings, StageContext context)
    {
        Face[] faces = input.Faces.Faces;
        FaceDomain[] domain = Domains(input);
        string[] setOfFace = new string[faces.Length];
        Array.Fill(setOfFace, "");
        var sets = new List<OrientationSet>();
        FaceDomain[] order = [FaceDomain.Host, FaceDomain.Dike, FaceDomain.Margin];
        for (int d = 0; d < order.Length; d++)
        {
            context.Stop.ThrowIfCancellationRequested();
            int[] members = [.. Enumerable.Range(0, faces.Length).Where(i => domain[i] == order[d])];
            if (members.Length > 0) sets.AddRange(OfDomain(input, settings, context, order[d], members, setOfFace));
            context.Progress((d + 1.0) / order.Length);
        }

        int outside = domain.Count(d => d == FaceDomain.Unknown);
        if (outside > 0)
        {
            Say(context, Invariant($"{outside} of {faces.Length} {(faces.Length == 1 ? "face" : "faces")} took no part: not in place, or of no known domain."), false);
        }

        return new SetsRecord { Sets = [.. sets], SetOfFace = setOfFace };
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

    private static OrientationSet[] OfDomain(
        SetsInput input, SetSettings settings, StageContext context, FaceDomain domain, int[] members, string[] setOfFace)
    {
        Face[] faces = input.Faces.Faces;
        string word = domain.ToString().ToLowerInvariant();
        JointPlane[] joined = JointPlanes.Of(faces, members, input.Faces.NoiseM, settings.ReachM);
        var planes = new DomainPlanes(
            domain,
            joined,
            [.. joined.Select(p => p.Normal)],
            Weights(joined, settings.Weighting),
            JointPlanes.Groups(faces, joined, input.Faces.NoiseM, settings.ReachM));
        var rules = new ClusterRules(settings.MostSets, settings.FewestPlanes, settings.ValleyDepth, settings.WidestDeg);
        AxisClusters clusters = AxisClusters.Find(planes.Poles, planes.Weights, rules, context.Seed, context.Stop);
        Remarks(context, word, clusters, joined.Length, members.Length, settings, domain);
        if (clusters.Count == 0) return [];

        // Numbered in order of exposed area.
        int[] byArea = [.. Enumerable.Range(0, clusters.Count)
            .OrderByDescending(c => joined.Where((_, i) => clusters.ClusterOf[i] == c).Sum(p => p.AreaM2)).ThenBy(c => c)];
        int[] rock = RockOf(input, members);
        (Symmetric3 Covariance, double Groups)[] regions = MixtureMeans.Of(clusters.Mixture, planes.Poles, planes.Weights, planes.Groups);
        double[][] shares = SharesOf(clusters.Mixture, planes);
        var sets = new OrientationSet[clusters.Count];
        for (int s = 0; s < byArea.Length; s++)
        {
            int c = byArea[s];
            int[] own = [.. Enumerable.Range(0, joined.Length).Where(i => clusters.ClusterOf[i] == c)];
            SetMean mean = SetMean.Of(
                clusters.Mixture.Components[c], planes.Poles, shares[c], regions[c].Covariance, regions[c].Groups, input.Frame.Reference);
            sets[s] = OneSet(input, settings, domain, Invariant($"{word}-{s + 1}"), [.. own.Select(i => joined[i])], mean, rock);
            foreach (int face in own.SelectMany(i => joined[i].Faces)) setOfFace[face] = sets[s].Set;
        }

        return sets;
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

    private static OrientationSet OneSet(
        SetsInput input, SetSettings settings, FaceDomain domain, string name, JointPlane[] planes, SetMean mean, int[] rock)
    {
        Face[] faces = input.Faces.Faces;
        Vec3 normal = mean.Mean;
        (double shape, double strength) = mean.Tensor.Woodcock;
        int[] own = [.. planes.SelectMany(p => p.Faces)];
        int[] planeOfFace = new int[faces.Length];
        Array.Fill(planeOfFace, -1);
        for (int p = 0; p < planes.Length; p++) foreach (int f in planes[p].Faces) planeOfFace[f] = p;
        double length = own.Average(f => faces[f].LengthM);
        double lane = settings.LaneM ?? Math.Max(length, 20 * input.Described.Cloud.SpacingM);
        return new OrientationSet
        {
            Set = name,
            Domain = domain,
            Count = own.Length,
            Mean = Attitude.FromNormal(normal, input.Frame.TurnDeg),
            Normal = normal,
            Kappa = mean.Kappa,
            Cone95Deg = mean.Region.Cone95Deg,
            S1 = mean.Tensor.S1,
            S2 = mean.Tensor.S2,
            S3 = mean.Tensor.S3,
            Shape = shape,
            Strength = strength,
            SpacingM = lane > 0 ? SetSpacing.Of(input.Described.Cloud, rock, planeOfFace, normal, lane) : null,
            ExposedLengthMeanM = length,
            Weighting = settings.Weighting.ToString().ToLowerInvariant(),
            NEffective = mean.Tensor.NEffective,
        };
    }

    private static double[] Weights(JointPlane[] planes, SetWeighting weighting)
    {
        // 5 deg: the scatter of a common joint set. A plane known worse than that tells less about its set.
        double scatter2 = Math.Pow(5 * Math.PI / 180, 2);
        return weighting == SetWeighting.Area
            ? [.. planes.Select(p => p.AreaM2)]
            : [.. planes.Select(p => scatter2 / (scatter2 + (p.ErrorRad * p.ErrorRad)))];
    }

    /// <summary>Per point: index of the face of the domain that it lies on, or -1.</summary>
    private static int[] RockOf(SetsInput input, int[] members)
    {
        bool[] inDomain = new bool[input.Faces.Faces.Length];
        foreach (int m in members) inDomain[m] = true;
        int[] rock = new int[Math.Min(input.Faces.FaceOfPoint.Length, input.Described.Cloud.Count)];
        for (int i = 0; i < rock.Length; i++)
        {
            int face = input.Faces.FaceOfPoint[i] - 1;
            rock[i] = face >= 0 && inDomain[face] ? face : -1;
        }

        return rock;
    }

    private static void Remarks(
        StageContext context, string word, AxisClusters clusters, int planes, int faces, SetSettings settings, FaceDomain domain)
    {
        if (clusters.Count == 0)
        {
            if (domain != FaceDomain.Margin)
            {
                string why = planes < settings.FewestPlanes
                    ? Invariant($"fewer than {settings.FewestPlanes} planes")
                    : clusters.TooWide > 0 ? "their poles scatter too widely" : "their poles are not gathered more than chance would have it";
                Say(context, Invariant($"No set in the {word}: {faces} {(faces == 1 ? "face" : "faces")} on {planes} {(planes == 1 ? "plane" : "planes")}, {why}."), false);
            }

            return;
        }

        int left = clusters.ClusterOf.Count(c => c < 0);
        bool doubtful = clusters.BicGap < CertainGap;
        string doubt = doubtful ? Invariant($" Another number of sets would fit nearly as well (BIC differs by {clusters.BicGap:0.0}).") : "";
        Say(
            context,
            Invariant($"{word}: {clusters.Count} {(clusters.Count == 1 ? "set" : "sets")} from {faces} {(faces == 1 ? "face" : "faces")} on {planes} separate {(planes == 1 ? "plane" : "planes")}; {left} {(left == 1 ? "plane belongs" : "planes belong")} to none.{doubt}"),
            doubtful);
    }

    private static void Say(StageContext context, string text, bool doubtful) => context.Say(new Remark("sets", text, doubtful));
}
