using System.Diagnostics;
using CloudStruct.Accuracy.Scores;
using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Directions;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Sets;
using CloudStruct.Records.Stages;
using CloudStruct.Simulate;
using CloudStruct.Stages.Describe;
using CloudStruct.Stages.Faces;
using CloudStruct.Stages.Intake;
using CloudStruct.Stages.Sets;
using CloudStruct.Stages.Thin;
using static System.FormattableString;

namespace CloudStruct.Accuracy;

/// <summary>Sets found on simulated outcrops whose true faces are handed over with errors of their attitudes and with false
/// faces among them, on the faces that the stages before find, and on drawn sets without any outcrop: found, missed, invented, error and coverage of the mean pole.</summary>
public sealed class SetsStudy : IStudy
{
    private const double Degree = Math.PI / 180;

    /// <summary>Smallest face handed over [m²].</summary>
    private const double SmallestM2 = 0.03;

    private readonly List<(bool Found, double LogRatio, bool Inside)> spacings = [];

    /// <inheritdoc/>
    public void Run(StudyOptions options)
    {
        string[] plans = options.Plans.Length > 0 ? options.Plans : ["demo", "no-dike", "two-dikes", "large", "drawn", "uniform"];
        Console.WriteLine("Sets from true faces with errors and false faces");
        Console.WriteLine("plan seed faces | true found invented | error median max, inside cone");
        SetScore sum = SetScore.None, real = SetScore.None;
        foreach (string plan in plans)
        {
            if (plan is "drawn" or "large" or "uniform" || DrawnSets.Has(plan)) continue;
            foreach (ulong seed in options.Seeds)
            {
                SimulatedOutcrop rock = Outcrop.Make(FacesStudy.Sized(OutcropPlan.ByName(plan), options.Points ?? 300_000), seed);
                sum += One(Invariant($"{plan} {seed} true"), rock, FromTruth(rock, seed), seed);
                real += One(Invariant($"{plan} {seed} found"), rock, FromStages(rock, seed), seed);
            }
        }

        PrintSpacing();
        Print("all outcrops, true faces", sum, "");
        Print("all outcrops, found faces", real, "");
        if (plans.Contains("large")) Large();
        DrawnSets.Run(options, plans);
        if (plans.Contains("uniform")) DrawnSets.Uniform(options);
    }

    /// <summary>Twenty thousand faces: how long it takes.</summary>
    private static void Large()
    {
        var all = new List<Face>();
        for (ulong seed = 1; all.Count < 20_000; seed++) all.AddRange(DrawnSets.Draw(DrawnSets.Large, 77).Faces.Select(f => f with { Middle = f.Middle + new Vec3(50 * seed, 0, 0) }));
        var input = new SetsInput(new SurveyFrame(), new FaceSet { Faces = [.. all.Take(20_000)], NoiseM = 0.005 }, new ContactsRecord(), new DescribedCloud());
        long start = Stopwatch.GetTimestamp();
        TimeSpan busy = Process.GetCurrentProcess().TotalProcessorTime;
        SetsRecord record = new SetsStage().Run(input, new SetSettings(), StageContext.Plain());
        TimeSpan used = Process.GetCurrentProcess().TotalProcessorTime - busy;
        Console.WriteLine(Invariant($"20000 faces: {record.Sets.Length} sets, {Stopwatch.GetElapsedTime(start).TotalSeconds:0.0} s, {used.TotalSeconds:0.0} s of processor"));
    }

    private SetScore One(string what, SimulatedOutcrop rock, SetsInput input, ulong seed)
    {
        long start = Stopwatch.GetTimestamp();
        SetsRecord record = new SetsStage().Run(input, new SetSettings(), StageContext.Plain(seed, 2, r => Console.WriteLine("    " + r.Text)));
        double seconds = Stopwatch.GetElapsedTime(start).TotalSeconds;
        SetScore score = Score(rock, input, record);
        Print(Invariant($"{what} {input.Faces.Faces.Length}"), score, Invariant($"{seconds:0.00} s"));
        foreach (OrientationSet s in record.Sets)
        {
            double truth = TrueSpacing(rock, s);
            if (s.SpacingM is { } e && double.IsFinite(truth)) spacings.Add((what.EndsWith("found", StringComparison.Ordinal), Math.Log(e.Value / truth), e.Low95 <= truth && truth <= e.High95));
            Console.WriteLine(Invariant($"    {s.Set} {s.Mean.StrikeDeg:000}/{s.Mean.DipDeg:00} faces {s.Count} n {s.NEffective:0.0} kappa {s.Kappa:0} cone {s.Cone95Deg:0.00} stable {s.Stability:0.00} spacing {s.SpacingM?.Value:0.00} ({s.SpacingM?.Low95:0.00}-{s.SpacingM?.High95:0.00}) true {TrueSpacing(rock, s):0.00} persistence {s.PersistenceM?.Value:0.00} ({s.PersistenceM?.Low95:0.00}-{s.PersistenceM?.High95:0.00}) blind {s.BlindShare:0.000}"));
        }

        return score;
    }

    /// <summary>Spacing of the host set whose pole is nearest, within 15 deg; NaN in a dike.</summary>
    private static double TrueSpacing(SimulatedOutcrop rock, OrientationSet set)
    {
        if (set.Domain != FaceDomain.Host || rock.HostSetPoles.Length == 0) return double.NaN;
        int nearest = Enumerable.Range(0, rock.HostSetPoles.Length).MaxBy(p => Math.Abs(rock.HostSetPoles[p].Dot(set.Normal)));
        return Math.Abs(rock.HostSetPoles[nearest].Dot(set.Normal)) > Math.Cos(15 * Degree) ? rock.HostSetSpacingM[nearest] : double.NaN;
    }

    /// <summary>What the stages before this one find; domain and place of a face by the truth of most of its points.</summary>
    private static SetsInput FromStages(SimulatedOutcrop rock, ulong seed)
    {
        StageContext context = StageContext.Plain(seed);
        IPieces pieces = new IntakeStage().Run(
            new SurveyInput { Name = rock.Name, Sources = [rock.AsSource()], Crs = rock.Crs }, new IntakeSettings(), context);
        WorkingCloud cloud = new ThinStage().Run(pieces, new ThinSettings(), context);
        DescribedCloud described = new DescribeStage().Run(cloud, new DescribeSettings(), context);
        FaceSet found = new FacesStage().Run(described, new FaceSettings(), context);
        int[] nearest = TruthOfPoints.Nearest(cloud, rock);
        int[][] dike = [.. found.Faces.Select(_ => new int[rock.Dikes.Length + 1])];
        int[,] votes = new int[found.Faces.Length, 4];
        for (int i = 0; i < cloud.Count; i++)
        {
            if (found.FaceOfPoint[i] == 0 || nearest[i] < 0) continue;
            int face = rock.TrueFace[nearest[i]];
            int kind = (RockClass)rock.TrueClass[nearest[i]] switch
            {
                RockClass.Host or RockClass.Dike or RockClass.Inclusion when face > 0 && rock.Faces[face - 1].Kind == FaceKind.Contact => 2,
                RockClass.Host => 0,
                RockClass.Dike or RockClass.Inclusion => 1,
                _ => 3,
            };
            votes[found.FaceOfPoint[i] - 1, kind]++;
            if (kind is 1 or 2) dike[found.FaceOfPoint[i] - 1][rock.TrueDike[nearest[i]]]++;
        }

        FaceDomain[] kinds = [FaceDomain.Host, FaceDomain.Dike, FaceDomain.Margin, FaceDomain.Unknown];
        int[] most = [.. Enumerable.Range(0, found.Faces.Length).Select(f => Enumerable.Range(0, 4).MaxBy(k => votes[f, k]))];
        var contacts = new ContactsRecord
        {
            DomainOfFace = [.. most.Select(k => kinds[k])],
            DikeOfFace = [.. most.Select((k, f) => k is 1 or 2 ? Array.IndexOf(dike[f], dike[f].Max()) : 0)],
            InPlaceOfFace = [.. most.Select(k => k == 3 ? InPlace.No : InPlace.Yes)],
        };
        return new SetsInput(cloud.Frame, found, contacts, described);
    }

    private static SetsInput FromTruth(SimulatedOutcrop rock, ulong seed)
    {
        SimulatedFace[] kept = [.. rock.Faces.Where(f => f.AreaM2 >= SmallestM2).OrderByDescending(f => f.AreaM2)];
        int[] number = new int[rock.Faces.Length + 1];
        var faces = new List<Face>();
        var domains = new List<FaceDomain>();
        var dikes = new List<int>();
        var places = new List<InPlace>();
        var d = new Draws(seed, 32, 0);
        foreach (SimulatedFace f in kept)
        {
            faces.Add(DrawnSets.Perturbed(f.Normal, f.Middle - rock.Origin, f.AreaM2, faces.Count + 1, ref d));
            number[f.Id] = faces.Count;
            domains.Add(f.Kind switch { FaceKind.Joint => FaceDomain.Host, FaceKind.CoolingJoint => FaceDomain.Dike, FaceKind.Contact => FaceDomain.Margin, _ => FaceDomain.Host });
            dikes.Add(f.Dike);
            places.Add(f.InPlace ? InPlace.Yes : InPlace.No);
        }

        // A fifth more small faces that are none, of any attitude, where real ones are.
        for (int i = 0; i < kept.Length / 5; i++)
        {
            int beside = d.NextBelow(kept.Length);
            faces.Add(DrawnSets.Perturbed(DrawnSets.Random(ref d), faces[beside].Middle + (DrawnSets.Random(ref d) * 0.5), 0.03 + (0.1 * d.NextUnit()), faces.Count + 1, ref d));
            domains.Add(domains[beside]);
            dikes.Add(dikes[beside]);
            places.Add(places[beside]);
        }

        var cloud = new WorkingCloud
        {
            X = [.. rock.X.Select(x => (float)(x - rock.Origin.X))],
            Y = [.. rock.Y.Select(y => (float)(y - rock.Origin.Y))],
            Z = [.. rock.Z.Select(z => (float)(z - rock.Origin.Z))],
            SpacingM = rock.SpacingM,
        };
        return new SetsInput(
            new SurveyFrame { Crs = rock.Crs, Origin = rock.Origin },
            new FaceSet { Faces = [.. faces], FaceOfPoint = [.. rock.TrueFace.Select(t => number[t])], NoiseM = rock.NoiseM, SmallestFaceM2 = SmallestM2 },
            new ContactsRecord { DomainOfFace = [.. domains], DikeOfFace = [.. dikes], InPlaceOfFace = [.. places] },
            new DescribedCloud { Cloud = cloud });
    }

    /// <summary>Scores host and dike; dike by dike where the sets say whose they are, otherwise all dikes together.</summary>
    internal static SetScore Score(SimulatedOutcrop rock, SetsInput input, SetsRecord record)
    {
        OrientationSet[] Of(FaceDomain domain) => [.. record.Sets.Where(s => s.Domain == domain && s.Zone.Length == 0)];
        SetScore score = Domain(FaceDomain.Host, rock.HostSetPoles, input, Of(FaceDomain.Host), _ => true);
        if (rock.DikeSetPoles.Length == 0) return score;
        OrientationSet[] sets = Of(FaceDomain.Dike);
        int[] told = input.Contacts.DikeOfFace;
        if (told.Length == 0) return score + Domain(FaceDomain.Dike, [.. rock.DikeSetPoles.SelectMany(p => p)], input, sets, _ => true);

        // Found dike of every true one; sets of the only dike found carry no number.
        SimulatedOutcrop local = rock with { Origin = input.Frame.Origin };
        DikeFrame[] frames = input.Contacts.Dikes;
        int[] numbers = [.. told.Where((d, i) => d > 0 && input.Contacts.DomainOfFace[i] == FaceDomain.Dike).Distinct()];
        for (int k = 0; k < rock.DikeSetPoles.Length; k++)
        {
            int truth = k;
            int[] own = frames.Length == 0 ? [truth + 1] : [.. frames.Where(f => WidthScore.Match(local, f) == truth).Select(f => f.Dike)];
            OrientationSet[] ofDike = [.. sets.Where(s => own.Contains(s.Dike > 0 ? s.Dike : numbers.Length == 1 ? numbers[0] : 0))];
            score += Domain(FaceDomain.Dike, rock.DikeSetPoles[truth], input, ofDike, i => own.Contains(told[i]));
        }

        return score;
    }

    private static SetScore Domain(FaceDomain domain, Vec3[] poles, SetsInput input, OrientationSet[] sets, Func<int, bool> counts)
    {
        // Shown: at least ten faces of 0.05 m² or more whose nearest true pole it is, within 15 deg.
        int[] faces = new int[poles.Length];
        for (int i = 0; i < input.Faces.Faces.Length; i++)
        {
            Face f = input.Faces.Faces[i];
            if (input.Contacts.DomainOfFace[i] != domain || input.Contacts.InPlaceOfFace[i] == InPlace.No || f.AreaM2 < 0.05 || !counts(i)) continue;
            int nearest = 0;
            for (int p = 1; p < poles.Length; p++) if (Math.Abs(f.Normal.Dot(poles[p])) > Math.Abs(f.Normal.Dot(poles[nearest]))) nearest = p;
            if (Math.Abs(f.Normal.Dot(poles[nearest])) > Math.Cos(15 * Degree)) faces[nearest]++;
        }

        return SetScore.Of(sets, poles, [.. faces.Select(n => n >= 10)]);
    }

    private void PrintSpacing()
    {
        foreach (var half in spacings.GroupBy(x => x.Found))
        {
            double[] sorted = [.. half.Select(x => x.LogRatio).Order()];
            double mean = sorted.Average(), sd = Math.Sqrt(sorted.Sum(x => (x - mean) * (x - mean)) / Math.Max(1, sorted.Length - 1));
            Console.WriteLine(Invariant($"host spacing, {(half.Key ? "found" : "true")} faces: stated over true median {Math.Exp(sorted[sorted.Length / 2]):0.00}, spread of the logarithm {sd:0.00}, inside {half.Count(x => x.Inside)} of {sorted.Length}"));
        }
    }

    internal static void Print(string what, SetScore s, string tail)
    {
        double[] sorted = [.. s.ErrorsDeg.Order()];
        double median = sorted.Length > 0 ? sorted[sorted.Length / 2] : double.NaN, max = sorted.Length > 0 ? sorted[^1] : double.NaN;
        double share = sorted.Length > 0 ? (double)s.Covered / sorted.Length : double.NaN;
        double[] ratio = [.. s.ErrorsDeg.Zip(s.ConesDeg).Select(p => p.First / p.Second).Order()];
        // The median error of a two-dimensional normal law is 0.481 of its 95 % radius.
        double sharp = ratio.Length > 0 ? 0.481 / Math.Max(1e-9, ratio[ratio.Length / 2]) : double.NaN;
        Console.WriteLine(Invariant($"{what} | {s.True} {s.Found} {s.Invented} | {median:0.00} {max:0.00}, {share:0.000} of {sorted.Length}, sharp {sharp:0.00} {tail}"));
    }
}
