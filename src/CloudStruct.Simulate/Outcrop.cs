using CloudStruct.Records.Classes;
using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Chance;
using CloudStruct.Simulate.Paint;
using CloudStruct.Simulate.Rock;
using CloudStruct.Simulate.Views;

namespace CloudStruct.Simulate;

/// <summary>Makes outcrops of known truth.</summary>
public static class Outcrop
{
    /// <summary>Rays per wanted point: enough that nearly every cube of the thinning lattice that can be seen is seen.</summary>
    private const double RaysPerPoint = 4;

    private const int Block = 4096;

    /// <summary>Makes one outcrop.</summary>
    /// <param name="plan">The kind of outcrop.</param>
    /// <param name="seed">Which member of the family; the same seed gives the same outcrop on any number of threads.</param>
    /// <param name="points">Points aimed at; null for the plan's.</param>
    /// <param name="threads">Workers; 0 for one per core.</param>
    /// <param name="flight">The same rock flown again on another day: other cameras, noise, sun and model errors; 0 for the first flight.</param>
    public static SimulatedOutcrop Make(OutcropPlan plan, ulong seed, int? points = null, int threads = 0, int flight = 0)
    {
        ulong day = flight == 0 ? seed : Dice.Scramble(seed + ((ulong)flight << 40));
        threads = threads > 0 ? threads : Environment.ProcessorCount;
        int wanted = points ?? plan.Points;
        (Massif massif, Vec3[] hostPoles, Vec3[][] dikePoles) = MassifMaker.Make(plan, seed, threads);
        Camera[] cameras = Flight.Plan(plan, massif.Terrain, day);
        Sight[] sights = Photographs.Take(massif, cameras, (int)Math.Min(60e6, RaysPerPoint * wanted), day, threads);
        sights = Thinning.To(wanted, sights, day);
        return Develop(plan, seed, day, massif, hostPoles, dikePoles, cameras, sights, threads);
    }

    private static SimulatedOutcrop Develop(
        OutcropPlan plan, ulong seed, ulong day, Massif massif, Vec3[] hostPoles, Vec3[][] dikePoles, Camera[] cameras, Sight[] sights, int threads)
    {
        int count = sights.Length;
        Vec3 origin = plan.Site.Origin;
        var noise = new SurveyNoise(plan, day);
        var surface = new Surface(massif, plan, seed);
        var light = new Daylight(massif, plan, day);
        var paint = new RockPaint(massif, plan, seed);
        var clasts = new Clasts(massif, seed);
        double[] x = new double[count], y = new double[count], z = new double[count];
        int coloured = plan.HasColour ? count : 0;
        byte[] red = new byte[coloured], green = new byte[coloured], blue = new byte[coloured];
        byte[] classes = new byte[count], dikeOf = new byte[count];
        var onPlane = new bool[count];
        var normals = new Vec3[count];
        Workers.For(count, threads, Block, (from, to) =>
        {
            var crossings = new CrossingList();
            for (int i = from; i < to; i++)
            {
                Sight s = sights[i];
                Vec3 n = normals[i] = surface.NormalOf(s);
                Wear wear = surface.WearAt(s, n);
                (RockClass kind, int rock) = Classify(massif, clasts, s);
                Vec3 p = noise.Apply(i, s.Place - (n * wear.InwardM), n, (s.Place - cameras[s.Camera].Place).Unit(), out bool stray);
                onPlane[i] = wear.OnPlane && !stray;
                classes[i] = (byte)(stray ? RockClass.Unknown : kind);
                dikeOf[i] = (byte)(stray ? 0 : rock);
                (x[i], y[i], z[i]) = (p.X + origin.X, p.Y + origin.Y, p.Z + origin.Z);
                if (!plan.HasColour) continue;
                var lot = new Dice(day, Purpose.Colour, (ulong)i + 1);
                ulong block = s.Kind is Hit.Kinds.Plane or Hit.Kinds.Margin ? BlockLot(massif, s, n) : (ulong)s.Surface * 0x9E3779B97F4A7C15UL;
                (double R, double G, double B) ground = paint.At(s.Place, n, kind, rock, block, wear), lit = light.On(s.Place, n, crossings, ref lot);
                (red[i], green[i], blue[i]) = Film.Expose((ground.R * lit.R, ground.G * lit.G, ground.B * lit.B), ref lot);
            }
        });
        double spacing = Spacing(sights);
        ModelTurn.Of(plan, day).Apply(x, y, z, origin);
        (int[] faceOf, SimulatedFace[] faces) = FaceTruth.Number(massif, sights, onPlane, normals, origin, spacing);
        return new SimulatedOutcrop
        {
            Name = plan.Place,
            Plan = plan,
            Seed = seed,
            X = x,
            Y = y,
            Z = z,
            Red = red,
            Green = green,
            Blue = blue,
            TrueFace = faceOf,
            TrueClass = classes,
            TrueDike = dikeOf,
            Faces = faces,
            Dikes = [.. massif.Dikes.Select(d => DikeTruth.Make(d, i => sights[i].Place, classes, dikeOf, origin, spacing))],
            Crs = plan.Site.Crs,
            Origin = origin,
            UphillDeg = massif.Terrain.UphillDeg,
            HostSetPoles = hostPoles,
            DikeSetPoles = dikePoles,
            HostSetSpacingM = TrueSpacing.OfHost(massif, hostPoles, sights, seed),
            NoiseM = noise.SharedM,
            NoiseLengthM = noise.LengthM,
            WhiteNoiseM = noise.WhiteM,
            SpacingM = spacing,
        };
    }

    private static (RockClass Kind, int Rock) Classify(Massif massif, Clasts clasts, Sight s)
    {
        if (s.Kind == Hit.Kinds.Loose) return (RockClass.Loose, 0);
        if (s.Kind == Hit.Kinds.Sheet && !massif.Planed) return (massif.Sheets[s.Surface].Kind, 0);
        if (s.Rock == 0) return (RockClass.Host, 0);
        return (clasts.Holds(s.Rock, s.Place) ? RockClass.Inclusion : RockClass.Dike, s.Rock);
    }

    private static ulong BlockLot(Massif massif, Sight s, Vec3 n)
    {
        JointTree tree = massif.Trees[s.Rock];
        return tree.BlockOf(tree.Find(s.Place - (n * 0.002))).Lot;
    }

    /// <summary>Root of the area per point, from cubes large enough to hold many points each.</summary>
    private static double Spacing(Sight[] sights)
    {
        if (sights.Length == 0) return 0;
        for (double edge = 0.25; ; edge *= 1.4)
        {
            var cubes = new HashSet<(int, int, int)>();
            foreach (Sight s in sights) cubes.Add(((int)Math.Floor(s.X / edge), (int)Math.Floor(s.Y / edge), (int)Math.Floor(s.Z / edge)));
            // A plane that lies anyhow passes through 1.5 cubes per area of a cube's side.
            if (sights.Length > 10 * cubes.Count || edge > 4) return Math.Sqrt(cubes.Count * edge * edge / 1.5 / sights.Length);
        }
    }
}
