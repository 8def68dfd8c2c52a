using CloudStruct.Accuracy.Scores;
using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Directions;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Sets;
using CloudStruct.Records.Stages;
using CloudStruct.Stages.Sets;
using static System.FormattableString;

namespace CloudStruct.Accuracy;

/// <summary>Sets drawn without any outcrop, in families that are hard in different ways, and axes without any set.</summary>
internal static class DrawnSets
{
    private const double Degree = Math.PI / 180;

    /// <summary>Two to five sets of each kind; planes are of each set.</summary>
    private static readonly Family[] Families =
    [
        new("tight", 2, 5, 15, 100, 100, 300),
        new("middle", 2, 5, 15, 100, 50, 100),
        new("loose", 2, 4, 15, 100, 20, 50),
        new("few", 2, 4, 8, 15, 40, 200),
        new("many", 2, 4, 80, 130, 30, 200),
        new("elongated", 2, 3, 20, 100, 60, 200) { Elongation = 2.5 },
        new("upright", 2, 4, 15, 80, 40, 200) { Plunge = new(0, 6) },
        new("level", 2, 3, 15, 80, 40, 200) { OneLevel = true },
        new("one-piece", 2, 4, 15, 100, 30, 200) { MostPieces = 1 },
    ];

    /// <summary>For timing.</summary>
    public static Family Large => new("large", 3, 3, 400, 400, 120, 120);

    /// <summary>Whether a plan is the name of a family.</summary>
    public static bool Has(string plan) => Array.Exists(Families, f => f.Name == plan);

    /// <summary>Draws and scores the families named, or all when "drawn" is asked for.</summary>
    public static void Run(StudyOptions options, string[] plans)
    {
        Family[] asked = [.. Families.Where(f => plans.Contains("drawn") || plans.Contains(f.Name))];
        if (asked.Length == 0) return;
        Console.WriteLine("Drawn sets at least 40 deg and 4 spreads apart, 0 to 30 % stray planes");
        Console.WriteLine("family | true found invented | error median max, inside cone");
        SetScore all = SetScore.None;
        foreach (Family family in asked)
        {
            SetScore sum = SetScore.None;
            int draws = Math.Max(1, 200 / Math.Max(1, options.Seeds.Length)), right = 0, total = 0;
            double stable = 0;
            foreach (ulong seed in options.Seeds)
            {
                for (int i = 0; i < draws; i++)
                {
                    (Vec3[] poles, Face[] faces) = Draw(family, (seed * 100_000) + (ulong)i);
                    OrientationSet[] sets = Sets(faces, seed + (ulong)i);
                    sum += SetScore.Of(sets, poles, [.. poles.Select(_ => true)]);
                    total++;
                    if (sets.Length == poles.Length) right++;
                    stable += sets.Length > 0 ? 1 : 0;
                }
            }

            all += sum;
            SetsStudy.Print(family.Name, sum, Invariant($"right number {(double)right / total:0.000}"));
        }

        SetsStudy.Print("all drawn", all, "");
    }

    /// <summary>Axes of any attitude: every set is invented.</summary>
    public static void Uniform(StudyOptions options)
    {
        Console.WriteLine("Uniform axes: planes, draws with an invented set of all draws");
        foreach (int n in new[] { 30, 60, 120, 250, 500 })
        {
            int invented = 0, draws = Math.Max(1, 300 / options.Seeds.Length);
            foreach (ulong seed in options.Seeds)
            {
                for (int i = 0; i < draws; i++)
                {
                    var d = new Draws((seed * 100_000) + (ulong)i, 33, (ulong)n);
                    var faces = new Face[n];
                    for (int k = 0; k < n; k++)
                    {
                        faces[k] = Perturbed(Random(ref d), new Vec3(40 * d.NextUnit(), 40 * d.NextUnit(), 10 * d.NextUnit()), 0.05 * Math.Exp(1.2 * Math.Abs(d.NextNormal())), k + 1, ref d);
                    }

                    if (Sets(faces, seed).Length > 0) invented++;
                }
            }

            Console.WriteLine(Invariant($"{n}: {invented} of {draws * options.Seeds.Length}"));
        }
    }

    /// <summary>True mean poles and faces of one member of a family.</summary>
    public static (Vec3[] Poles, Face[] Faces) Draw(Family family, ulong seed)
    {
        var d = new Draws(seed, 31, 0);
        int sets = family.FewestSets + d.NextBelow(family.MostSets - family.FewestSets + 1);
        var poles = new List<Vec3>();
        double[] kappa = [.. Enumerable.Range(0, sets).Select(_ => 0.0)];
        for (int s = 0; s < sets; s++) kappa[s] = family.KappaFrom * Math.Pow(family.KappaTo / family.KappaFrom, d.NextUnit());
        for (int tries = 0; poles.Count < sets; tries++)
        {
            if (tries > 2000)
            {
                poles.Clear();
                tries = 0;
            }

            int s = poles.Count;
            Vec3 p = Pole(family, s, ref d);
            double own = Spread(kappa[s]) * Math.Sqrt(family.Elongation);
            if (Enumerable.Range(0, s).All(o => Math.Abs(p.Dot(poles[o])) < Math.Cos(Math.Max(40 * Degree, 2 * (own + (Spread(kappa[o]) * Math.Sqrt(family.Elongation))))))) poles.Add(p);
        }

        var faces = new List<Face>();
        int all = 0;
        for (int s = 0; s < sets; s++)
        {
            int planes = (int)Math.Round(family.PlanesFrom * Math.Pow((double)family.PlanesTo / family.PlanesFrom, d.NextUnit()));
            all += planes;
            double turn = Math.PI * d.NextUnit(), wide = Spread(kappa[s]) * Math.Sqrt(family.Elongation), narrow = Spread(kappa[s]) / Math.Sqrt(family.Elongation);
            for (int i = 0; i < planes; i++)
            {
                Vec3 plane = family.Elongation == 1 ? Fisher.Draw(poles[s], kappa[s], ref d) : Elongated(poles[s], turn, wide, narrow, ref d);
                Pieces(faces, plane, family.MostPieces, ref d);
            }
        }

        double strayShare = 0.3 * d.NextUnit();
        for (int i = (int)(all * strayShare / (1 - strayShare)); i > 0; i--) Pieces(faces, Random(ref d), family.MostPieces, ref d);
        return ([.. poles], [.. faces]);
    }

    /// <summary>An axis of any attitude.</summary>
    public static Vec3 Random(ref Draws d)
    {
        double z = (2 * d.NextUnit()) - 1, a = 2 * Math.PI * d.NextUnit(), h = Math.Sqrt(1 - (z * z));
        return new Vec3(h * Math.Cos(a), h * Math.Sin(a), z);
    }

    /// <summary>A face with the attitude error that the targets for faces have: about 0.9 deg at 0.1 m², falling with the area.</summary>
    public static Face Perturbed(Vec3 normal, Vec3 at, double area, int id, ref Draws d)
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

    private static OrientationSet[] Sets(Face[] faces, ulong seed)
    {
        var input = new SetsInput(new SurveyFrame(), new FaceSet { Faces = faces, NoiseM = 0.005 }, new ContactsRecord(), new DescribedCloud());
        return new SetsStage().Run(input, new SetSettings(), StageContext.Plain(seed)).Sets;
    }

    private static double Spread(double kappa) => 1 / Math.Sqrt(kappa);

    private static Vec3 Pole(Family family, int number, ref Draws d)
    {
        if (family.OneLevel && number == 0)
        {
            double a = 2 * Math.PI * d.NextUnit(), tilt = 6 * Degree * d.NextUnit();
            return new Vec3(Math.Sin(tilt) * Math.Cos(a), Math.Sin(tilt) * Math.Sin(a), Math.Cos(tilt));
        }

        if (family.Plunge is not { } range) return Random(ref d);
        return new TrendPlunge(360 * d.NextUnit(), range.From + ((range.To - range.From) * d.NextUnit())).ToVector();
    }

    private static Vec3 Elongated(Vec3 mean, double turn, double wide, double narrow, ref Draws d)
    {
        (Vec3 e1, Vec3 e2) = Tangent.Axes(mean);
        Vec3 along = (e1 * Math.Cos(turn)) + (e2 * Math.Sin(turn)), across = (e2 * Math.Cos(turn)) - (e1 * Math.Sin(turn));
        return (mean + (along * (wide * d.NextNormal())) + (across * (narrow * d.NextNormal()))).Unit();
    }

    private static void Pieces(List<Face> faces, Vec3 plane, int most, ref Draws d)
    {
        var place = new Vec3(40 * d.NextUnit(), 40 * d.NextUnit(), 10 * d.NextUnit());
        (Vec3 e1, Vec3 e2) = Tangent.Axes(plane);
        int pieces = 1 + d.NextBelow(most);
        for (int k = 0; k < pieces; k++)
        {
            double area = 0.05 * Math.Exp(1.2 * Math.Abs(d.NextNormal()));
            Vec3 at = place + (e1 * (1.5 * d.NextNormal())) + (e2 * (1.5 * d.NextNormal()));
            faces.Add(Perturbed(plane, at, area, faces.Count + 1, ref d));
        }
    }

    /// <summary>How sets are drawn; numbers of planes and concentrations evenly in their logarithm.</summary>
    internal sealed record Family(string Name, int FewestSets, int MostSets, int PlanesFrom, int PlanesTo, double KappaFrom, double KappaTo)
    {
        /// <summary>Largest over smallest spread of a set.</summary>
        public double Elongation { get; init; } = 1;

        /// <summary>Plunge of the mean poles [deg]; null for any.</summary>
        public (double From, double To)? Plunge { get; init; }

        /// <summary>Whether the first set is nearly level.</summary>
        public bool OneLevel { get; init; }

        /// <summary>Most faces in which a plane shows.</summary>
        public int MostPieces { get; init; } = 4;
    }
}
