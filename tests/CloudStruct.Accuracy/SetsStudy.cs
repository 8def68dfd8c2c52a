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

    /// <inheritdoc/>
    public void Run(StudyOptions options)
    {
        string[] plans = options.Plans.Length > 0 ? options.Plans : ["demo", "no-dike", "two-dikes", "large", "drawn"];
        Console.WriteLine("Sets from true faces with errors and false faces");
        Console.WriteLine("plan seed faces | true found invented | error median max, inside cone");
        SetScore sum = SetScore.None, real = SetScore.None;
        foreach (string plan in plans)
        {
            if (plan is "drawn" or "large") continue;
            foreach (ulong seed in options.Seeds)
            {
                SimulatedOutcrop rock = Outcrop.Make(FacesStudy.Sized(OutcropPlan.ByName(plan), options.Points ?? 300_000), seed);
                sum += One(Invariant($"{plan} {seed} true"), rock, FromTruth(rock, seed), seed);
                real += One(Invariant($"{plan} {seed} found"), rock, FromStages(rock, seed), seed);
            }
        }

        Print("all outcrops, true faces", sum, "");
        Print("all outcrops, found faces", real, "");
        if (plans.Contains("large")) Large();
        if (plans.Contains("drawn")) Drawn();
    }

    /// <summary>Sets drawn from Fisher's law: how many planes, how tight; each plane shows in one to four faces.</summary>
    private static void Drawn()
    {
        Console.WriteLine("Drawn sets, one to three at least 40 deg apart, 20 % stray planes; 200 draws a line");
        Console.WriteLine("planes kappa | true found invented | error median max, inside cone");
        foreach (int planes in new[] { 8, 20, 60 })
        {
            foreach (double kappa in new[] { 20.0, 60, 200 })
            {
                SetScore sum = SetScore.None;
                for (ulong i = 0; i < 200; i++)
                {
                    (Vec3[] poles, Face[] faces) = DrawFaces(planes, kappa, (i * 1000) + (ulong)planes);
                    var input = new SetsInput(new SurveyFrame(), new FaceSet { Faces = faces, NoiseM = 0.005 }, new ContactsRecord(), new DescribedCloud());
                    SetsRecord record = new SetsStage().Run(input, new SetSettings(), StageContext.Plain(i));
                    sum += SetScore.Of(record.Sets, poles, [.. poles.Select(_ => true)]);
                }

                Print(Invariant($"{planes} {kappa}"), sum, "");
            }
        }
    }

    /// <summary>Twenty thousand faces: how long it takes.</summary>
    private static void Large()
    {
        var all = new List<Face>();
        for (ulong seed = 1; all.Count < 20_000; seed++) all.AddRange(DrawFaces(400, 120, 77).Faces.Select(f => f with { Middle = f.Middle + new Vec3(50 * seed, 0, 0) }));
        var input = new SetsInput(new SurveyFrame(), new FaceSet { Faces = [.. all.Take(20_000)], NoiseM = 0.005 }, new ContactsRecord(), new DescribedCloud());
        long start = Stopwatch.GetTimestamp();
        TimeSpan busy = Process.GetCurrentProcess().TotalProcessorTime;
        SetsRecord record = new SetsStage().Run(input, new SetSettings(), StageContext.Plain());
        TimeSpan used = Process.GetCurrentProcess().TotalProcessorTime - busy;
        Console.WriteLine(Invariant($"20000 faces: {record.Sets.Length} sets, {Stopwatch.GetElapsedTime(start).TotalSeconds:0.0} s, {used.TotalSeconds:0.0} s of processor"));
    }

    private static (Vec3[] Poles, Face[] Faces) DrawFaces(int planes, double kappa, ulong seed)
    {
        var d = new Draws(seed, 31, 0);
        int sets = 1 + d.NextBelow(3);
        var poles = new List<Vec3>();
        while (poles.Count < sets)
        {
            Vec3 p = Random(ref d);
            if (poles.TrueForAll(o => Math.Abs(o.Dot(p)) < Math.Cos(40 * Degree))) poles.Add(p);
        }

        var faces = new List<Face>();
        int all = planes * sets * 5 / 4;
        for (int i = 0; i < all; i++)
        {
            Vec3 plane = i < planes * sets ? Fisher.Draw(poles[i % sets], kappa, ref d) : Random(ref d);
            var place = new Vec3(40 * d.NextUnit(), 40 * d.NextUnit(), 10 * d.NextUnit());
            (Vec3 e1, Vec3 e2) = Tangent.Axes(plane);
            int pieces = 1 + d.NextBelow(4);
            for (int k = 0; k < pieces; k++)
            {
                double area = 0.05 * Math.Exp(1.2 * Math.Abs(d.NextNormal()));
                Vec3 at = place + (e1 * (1.5 * d.NextNormal())) + (e2 * (1.5 * d.NextNormal()));
                faces.Add(Perturbed(plane, at, area, faces.Count + 1, ref d));
            }
        }

        return ([.. poles], [.. faces]);
    }

    private static Vec3 Random(ref Draws d)
    {
        double z = (2 * d.NextUnit()) - 1, a = 2 * Math.PI * d.NextUnit(), h = Math.Sqrt(1 - (z * z));
        return new Vec3(h * Math.Cos(a), h * Math.Sin(a), z);
    }

    // Attitude errors as the targets for faces have them: about 0.9 deg at 0.1 m², falling with the area.
    private static Face Perturbed(Vec3 normal, Vec3 at, double area, int id, ref Draws d)
    {
        double sigma = 0.28 * Degree / Math.Sqrt(area);
        (Vec3 e1, Vec3 e2) = Tangent.Axes(normal);
        Vec3 n = (normal + (e1 * (sigma * d.NextNormal())) + (e2 * (sigma * d.NextNormal()))).Unit();
        return new Face
        {
            FaceId = id,
            Normal = n.Z < 0 ? -n : n,
            Middle = at,
            AreaM2 = area,
            LengthM = Math.Sqrt(area),
            Region = new PoleRegion { Cone95Deg = 2.4477 * sigma / Degree },
        };
    }

    private static SetScore One(string what, SimulatedOutcrop rock, SetsInput input, ulong seed)
    {
        long start = Stopwatch.GetTimestamp();
        SetsRecord record = new SetsStage().Run(input, new SetSettings(), StageContext.Plain(seed, 2, r => Console.WriteLine("    " + r.Text)));
        double seconds = Stopwatch.GetElapsedTime(start).TotalSeconds;
        SetScore score = Score(rock, input, record);
        Print(Invariant($"{what} {input.Faces.Faces.Length}"), score, Invariant($"{seconds:0.00} s"));
        foreach (OrientationSet s in record.Sets)
        {
            Console.WriteLine(Invariant($"    {s.Set} {s.Mean.StrikeDeg:000}/{s.Mean.DipDeg:00} faces {s.Count} n {s.NEffective:0.0} kappa {s.Kappa:0} cone {s.Cone95Deg:0.00} spacing {s.SpacingM?.Value:0.00} ({s.SpacingM?.Low95:0.00}-{s.SpacingM?.High95:0.00})"));
        }

        return score;
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
        }

        FaceDomain[] kinds = [FaceDomain.Host, FaceDomain.Dike, FaceDomain.Margin, FaceDomain.Unknown];
        int[] most = [.. Enumerable.Range(0, found.Faces.Length).Select(f => Enumerable.Range(0, 4).MaxBy(k => votes[f, k]))];
        var contacts = new ContactsRecord
        {
            DomainOfFace = [.. most.Select(k => kinds[k])],
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
        var places = new List<InPlace>();
        var d = new Draws(seed, 32, 0);
        foreach (SimulatedFace f in kept)
        {
            faces.Add(Perturbed(f.Normal, f.Middle - rock.Origin, f.AreaM2, faces.Count + 1, ref d));
            number[f.Id] = faces.Count;
            domains.Add(f.Kind switch { FaceKind.Joint => FaceDomain.Host, FaceKind.CoolingJoint => FaceDomain.Dike, FaceKind.Contact => FaceDomain.Margin, _ => FaceDomain.Host });
            places.Add(f.InPlace ? InPlace.Yes : InPlace.No);
        }

        // A fifth more small faces that are none, of any attitude, where real ones are.
        for (int i = 0; i < kept.Length / 5; i++)
        {
            int beside = d.NextBelow(kept.Length);
            faces.Add(Perturbed(Random(ref d), faces[beside].Middle + (Random(ref d) * 0.5), 0.03 + (0.1 * d.NextUnit()), faces.Count + 1, ref d));
            domains.Add(domains[beside]);
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
            new ContactsRecord { DomainOfFace = [.. domains], InPlaceOfFace = [.. places] },
            new DescribedCloud { Cloud = cloud });
    }

    /// <summary>Scores host and dike; joints of several dikes are sought together, so their poles are pooled where they agree.</summary>
    internal static SetScore Score(SimulatedOutcrop rock, SetsInput input, SetsRecord record)
    {
        SetScore host = Domain(FaceDomain.Host, rock.HostSetPoles, input, record);
        Vec3[] dike = [.. rock.DikeSetPoles.SelectMany(p => p)];
        return dike.Length == 0 ? host : host + Domain(FaceDomain.Dike, dike, input, record);
    }

    private static SetScore Domain(FaceDomain domain, Vec3[] poles, SetsInput input, SetsRecord record)
    {
        // Shown: at least ten faces of 0.05 m² or more whose nearest true pole it is, within 15 deg.
        int[] faces = new int[poles.Length];
        for (int i = 0; i < input.Faces.Faces.Length; i++)
        {
            Face f = input.Faces.Faces[i];
            if (input.Contacts.DomainOfFace[i] != domain || input.Contacts.InPlaceOfFace[i] == InPlace.No || f.AreaM2 < 0.05) continue;
            int nearest = 0;
            for (int p = 1; p < poles.Length; p++) if (Math.Abs(f.Normal.Dot(poles[p])) > Math.Abs(f.Normal.Dot(poles[nearest]))) nearest = p;
            if (Math.Abs(f.Normal.Dot(poles[nearest])) > Math.Cos(15 * Degree)) faces[nearest]++;
        }

        return SetScore.Of([.. record.Sets.Where(s => s.Domain == domain)], poles, [.. faces.Select(n => n >= 10)]);
    }

    private static void Print(string what, SetScore s, string tail)
    {
        double[] sorted = [.. s.ErrorsDeg.Order()];
        double median = sorted.Length > 0 ? sorted[sorted.Length / 2] : double.NaN, max = sorted.Length > 0 ? sorted[^1] : double.NaN;
        double share = sorted.Length > 0 ? (double)s.Covered / sorted.Length : double.NaN;
        Console.WriteLine(Invariant($"{what} | {s.True} {s.Found} {s.Invented} | {median:0.00} {max:0.00}, {share:0.000} of {sorted.Length} {tail}"));
    }
}
