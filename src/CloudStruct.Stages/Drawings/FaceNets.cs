using CloudStruct.Maths.Directions;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Sets;
using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Drawings;

/// <summary>Stereonets of the faces, one per domain that has any.</summary>
internal static class FaceNets
{
    // With fewer poles a contour says no more than the poles themselves.
    private const int FewestForContours = 10;

    /// <summary>Order of domains on every sheet.</summary>
    internal static readonly FaceDomain[] Order = [FaceDomain.Host, FaceDomain.Dike, FaceDomain.Margin, FaceDomain.Unknown];

    /// <summary>The nets, in order of domains.</summary>
    public static IEnumerable<NetDrawing> Of(Findings input, DrawingSettings settings, StageContext context)
    {
        ExposureWeights? exposure = null;
        foreach (FaceDomain domain in Order)
        {
            int[] own = Own(input, domain);
            if (own.Length == 0) continue;
            int loose = All(input, domain).Count() - own.Length;
            yield return One(input, settings, context, domain, own, loose, null);
            if (settings.Contours && settings.WeightedNets && own.Length >= FewestForContours && domain != FaceDomain.Unknown)
                yield return One(input, settings, context, domain, own, loose, exposure ??= new ExposureWeights(input));
        }
    }

    /// <summary>Faces of a domain that are not known to be out of place.</summary>
    internal static int[] Own(Findings input, FaceDomain domain)
    {
        Face[] faces = input.Faces.Faces;
        InPlace[] place = input.Contacts.InPlaceOfFace;
        return [.. All(input, domain).Where(i => (place.Length == faces.Length ? place[i] : faces[i].InPlace) != InPlace.No)];
    }

    private static IEnumerable<int> All(Findings input, FaceDomain domain)
    {
        FaceDomain[] told = input.Contacts.DomainOfFace;
        int count = input.Faces.Faces.Length;
        return Enumerable.Range(0, count).Where(i => (told.Length == count ? told[i] : FaceDomain.Host) == domain);
    }

    private static NetDrawing One(Findings input, DrawingSettings settings, StageContext context, FaceDomain domain, int[] own, int loose, ExposureWeights? exposure)
    {
        bool weighted = exposure is not null;
        Face[] faces = input.Faces.Faces;
        SurveyFrame frame = input.Described.Cloud.Frame;
        double turn = frame.TurnDeg;
        string[] setOf = input.Sets.SetOfFace;
        OrientationSet[] sets = [.. input.Sets.Sets.Where(s => s.Domain == domain && s.Zone == "")];
        var curves = new List<NetCurve>();
        foreach (OrientationSet s in sets)
        {
            curves.Add(new NetCurve("great_circle", s.Set, 0, NetCurves.GreatCircle(s.Normal, turn)));
            foreach (Point2[] ring in NetCurves.SmallCircle(s.Normal, s.Cone95Deg, turn)) curves.Add(new NetCurve("cone", s.Set, 0, ring));
        }

        double[] levels = [];
        Vec3[] normals = [.. own.Select(i => faces[i].Normal)];
        double[]? weights = exposure?.Of(normals);
        double worth = weights is null ? own.Length : Math.Pow(weights.Sum(), 2) / weights.Sum(w => w * w);
        SmoothDensity density = SmoothDensity.ForDrawing(Math.Max(1, (int)Math.Round(worth)));
        if (settings.Contours && own.Length >= FewestForContours)
        {
            NetContours contours = NetContours.Of(normals, density, context.Threads, context.Stop, weights);
            levels = contours.Levels();
            foreach (double level in levels) curves.AddRange(contours.Curves(level, turn).Select(c => new NetCurve("contour", "", level, c)));
        }

        string word = Word(domain);
        return new NetDrawing
        {
            Name = "net-" + domain.ToString().ToLowerInvariant() + (weighted ? "-weighted" : ""),
            Title = Invariant($"Poles of {(own.Length == 1 ? "the one face" : Words.Count(own.Length, "face", "faces"))} {word}{(weighted ? ", weighted for the exposure" : "")}"),
            Poles = [.. own.Select(i => new NetPole(
                EqualAreaNet.OfAxis(faces[i].Normal, turn), faces[i].AreaM2, setOf.Length == faces.Length ? setOf[i] : "", faces[i].FaceId))],
            Curves = [.. curves],
            Groups = [.. sets.Select(s => s.Set)],
            Sentence = Sentence(frame, own.Length, loose, sets, levels, density, weights),
            HasNorth = frame.North != North.Model,
        };
    }

    /// <summary>Where the faces of a domain are.</summary>
    internal static string Word(FaceDomain domain) => domain switch
    {
        FaceDomain.Host => "in the host rock",
        FaceDomain.Dike => "in the dike",
        FaceDomain.Margin => "on exposed contacts",
        _ => "of no known domain",
    };

    private static string Sentence(
        SurveyFrame frame, int count, int loose, OrientationSet[] sets, double[] levels, SmoothDensity density, double[]? weights)
    {
        var text = new List<string> { "Equal area, lower hemisphere; " + Words.Count(count, "face", "faces") + "." };
        if (loose > 0) text.Add(Words.Count(loose, "face", "faces") + " out of place " + (loose == 1 ? "is" : "are") + " left out.");
        if (sets.Length > 0)
        {
            string how = sets[0].Weighting == "area"
                ? "planes weighted by exposed area"
                : "each plane counted once, less where its attitude is uncertain";
            text.Add(Invariant($"Mean planes and their 95 % cones of {Words.Count(sets.Length, "set", "sets")}: {how}."));
        }

        if (levels.Length > 0)
        {
            string kernel = density.K >= SmoothDensity.NarrowestForDrawing
                ? Invariant($"exponential kernel after Vollmer (1995), held at k = {density.K:0}")
                : Invariant($"exponential kernel after Vollmer (1995), k = {density.K:0.0}");
            string counted = weights is null
                ? "each face counted once"
                : Invariant($"each face weighted by 1/sine of its angle with the exposed ground (Terzaghi 1965; weights {weights.Min():0.0} to {weights.Max():0.0}, at most 10)");
            text.Add(Invariant($"Contours: {counted}, {kernel}, at {Words.List([.. levels.Select(l => Invariant($"{l:0}"))])} standard deviations above uniform."));
        }

        text.Add(Words.North(frame));
        return string.Join(" ", text);
    }
}
