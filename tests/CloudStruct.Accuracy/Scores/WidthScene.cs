using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Simulate;

namespace CloudStruct.Accuracy.Scores;

/// <summary>A simulated outcrop made ready for contacts and width by itself, without the stages before them: thinned, with
/// neighbours and colour, classes from the truth with errors such as a classifier makes.</summary>
public sealed class WidthScene
{
    private const ulong Purpose = 0x57494454;

    private WidthScene(SimulatedOutcrop outcrop, DescribedCloud described, ClassifiedCloud classes)
    {
        Outcrop = outcrop;
        Described = described;
        Classes = classes;
    }

    /// <summary>The outcrop and its truth.</summary>
    public SimulatedOutcrop Outcrop { get; }

    /// <summary>Working cloud with colour.</summary>
    public DescribedCloud Described { get; }

    /// <summary>Perturbed classes.</summary>
    public ClassifiedCloud Classes { get; }

    /// <summary>Makes one.</summary>
    /// <param name="plan">Plan.</param>
    /// <param name="seed">Seed.</param>
    /// <param name="points">Points aimed at; null: as the plan says.</param>
    /// <param name="jitterM">Standard deviation by which labels wander about the true margins, correlated over some decimetres [m].</param>
    public static WidthScene Make(OutcropPlan plan, ulong seed, int? points, double jitterM)
    {
        SimulatedOutcrop outcrop = Outcrop_(plan, seed, points);
        (WorkingCloud cloud, int[] source) = Thin(outcrop);
        DescribedCloud described = Normals(cloud);
        if (cloud.HasColour) described = Colour(described);
        return new WidthScene(outcrop, described, Label(outcrop, cloud, source, seed, jitterM));
    }

    private static SimulatedOutcrop Outcrop_(OutcropPlan plan, ulong seed, int? points) => Simulate.Outcrop.Make(plan, seed, points);

    private static (WorkingCloud Cloud, int[] Source) Thin(SimulatedOutcrop o)
    {
        double h = Math.Max(0.02, o.SpacingM), cell = 3 * h;
        var seen = new Dictionary<(int, int, int), int>();
        for (int i = 0; i < o.Count; i++)
        {
            Vec3 p = o.Place(i) - o.Origin;
            seen.TryAdd(((int)Math.Floor(p.X / h), (int)Math.Floor(p.Y / h), (int)Math.Floor(p.Z / h)), i);
        }

        int[] source = [.. seen.Values.OrderBy(i => Math.Floor((o.Z[i] - o.Origin.Z) / cell)).ThenBy(i => Math.Floor((o.Y[i] - o.Origin.Y) / cell)).ThenBy(i => o.X[i])];
        var cells = new Dictionary<(int, int, int), List<int>>();
        var place = source.Select(i => o.Place(i) - o.Origin).ToArray();
        (int, int, int) Key(Vec3 p) => ((int)Math.Floor(p.X / cell), (int)Math.Floor(p.Y / cell), (int)Math.Floor(p.Z / cell));
        for (int i = 0; i < place.Length; i++)
        {
            if (!cells.TryGetValue(Key(place[i]), out List<int>? list)) cells[Key(place[i])] = list = [];
            list.Add(i);
        }

        var neighbours = new int[place.Length * WorkingCloud.K];
        BlockParallel.For(place.Length, 2, CancellationToken.None, (from, to) =>
        {
            var near = new List<(double D, int I)>();
            for (int i = from; i < to; i++)
            {
                near.Clear();
                (int cx, int cy, int cz) = Key(place[i]);
                for (int k = 0; k < 27; k++)
                {
                    if (!cells.TryGetValue((cx + (k % 3) - 1, cy + (k / 3 % 3) - 1, cz + (k / 9) - 1), out List<int>? list)) continue;
                    foreach (int j in list)
                    {
                        Vec3 d = place[j] - place[i];
                        if (j != i && d.Dot(d) <= cell * cell) near.Add((d.Dot(d), j));
                    }
                }

                near.Sort();
                for (int k = 0; k < WorkingCloud.K; k++) neighbours[(i * WorkingCloud.K) + k] = k < near.Count ? near[k].I : -1;
            }
        });
        var cloud = new WorkingCloud
        {
            Frame = new SurveyFrame { Origin = o.Origin, Crs = o.Crs },
            X = [.. place.Select(p => (float)p.X)], Y = [.. place.Select(p => (float)p.Y)], Z = [.. place.Select(p => (float)p.Z)],
            Red = o.Red.Length == 0 ? [] : [.. source.Select(i => o.Red[i])],
            Green = o.Red.Length == 0 ? [] : [.. source.Select(i => o.Green[i])],
            Blue = o.Red.Length == 0 ? [] : [.. source.Select(i => o.Blue[i])],
            SpacingM = h, Neighbours = neighbours, NeighbourRadiusM = cell,
        };
        return (cloud, source);
    }

    private static DescribedCloud Normals(WorkingCloud cloud)
    {
        var d = new DescribedCloud { Cloud = cloud, NormalX = new float[cloud.Count], NormalY = new float[cloud.Count], NormalZ = new float[cloud.Count] };
        BlockParallel.For(cloud.Count, 2, CancellationToken.None, (from, to) =>
        {
            for (int i = from; i < to; i++)
            {
                var sums = new Moments(cloud.Place(i));
                for (int k = i * WorkingCloud.K; k < (i + 1) * WorkingCloud.K && cloud.Neighbours[k] >= 0; k++)
                {
                    int j = cloud.Neighbours[k];
                    sums.Add(cloud.X[j], cloud.Y[j], cloud.Z[j]);
                }

                Vec3 n = sums.Weight < 3 ? Vec3.Up : PlaneFit.From(sums).Normal;
                (d.NormalX[i], d.NormalY[i], d.NormalZ[i]) = ((float)n.X, (float)n.Y, (float)n.Z);
            }
        });
        return d;
    }

    // ln(R/G) and ln(B/G) of linear light, and cube-root lightness in place of L*: enough to tell two rocks apart.
    private static DescribedCloud Colour(DescribedCloud d)
    {
        int n = d.Cloud.Count;
        float[] l = new float[n], rg = new float[n], bg = new float[n];
        for (int i = 0; i < n; i++)
        {
            double r = Linear(d.Cloud.Red[i]), g = Linear(d.Cloud.Green[i]), b = Linear(d.Cloud.Blue[i]);
            l[i] = (float)((116 * Math.Cbrt((0.2126 * r) + (0.7152 * g) + (0.0722 * b))) - 16);
            rg[i] = (float)Math.Log(r / g);
            bg[i] = (float)Math.Log(b / g);
        }

        return d with { LStar = l, AStar = new float[n], BStar = new float[n], LogRedGreen = rg, LogBlueGreen = bg };
    }

    private static double Linear(byte v) => Math.Pow(Math.Max((byte)1, v) / 255.0, 2.2);

    private static ClassifiedCloud Label(SimulatedOutcrop o, WorkingCloud cloud, int[] source, ulong seed, double jitterM)
    {
        int n = cloud.Count;
        byte[] kind = new byte[n], probability = new byte[n], dikeOf = new byte[n];
        Wander[] wander = [.. Enumerable.Range(0, 2 * o.Dikes.Length).Select(i => new Wander(seed, (ulong)i, jitterM))];
        var islands = new Islands(seed, cloud, jitterM > 0 ? 1 : 0);
        for (int i = 0; i < n; i++)
        {
            kind[i] = o.TrueClass[source[i]];
            if (kind[i] == (byte)RockClass.Inclusion) kind[i] = (byte)RockClass.Dike;
            if (kind[i] is not ((byte)RockClass.Host or (byte)RockClass.Dike)) continue;
            Vec3 local = cloud.Place(i), place = local + o.Origin;
            double inside = double.NegativeInfinity;
            byte which = 0;
            for (int k = 0; k < o.Dikes.Length; k++)
            {
                double own = Math.Min(
                    o.Dikes[k].SignedFromA(place) + wander[2 * k].At(local), -o.Dikes[k].SignedFromB(place) + wander[(2 * k) + 1].At(local));
                if (own > inside) (inside, which) = (own, (byte)(k + 1));
            }

            if (which == 0) continue;
            if (inside > -1 && islands.Holds(local)) inside = -inside;
            bool dike = inside > 0;
            kind[i] = (byte)(dike ? RockClass.Dike : RockClass.Host);
            dikeOf[i] = dike ? which : (byte)0;
            probability[i] = (byte)Math.Round(255 / (1 + Math.Exp(-Math.Clamp(inside / 0.05, -20, 20))));
        }

        return new ClassifiedCloud
        {
            Class = kind, DikeProbability = probability, DikeOfPoint = dikeOf, UsedColour = cloud.HasColour, ThinnestDikeM = 0.3,
            Dikes = [.. o.Dikes.Select(d => Guess(o, d, seed))],
        };
    }

    // A first guess such as a slab search gives: some degrees off, shifted by a tenth of the width.
    private static DikeBody Guess(SimulatedOutcrop o, SimulatedDike d, ulong seed)
    {
        var draws = new Draws(seed, Purpose, (ulong)d.Number);
        var windows = new List<SlabWindow>();
        const double step = 4;
        for (double s = d.Extent.FromM + (step / 2); s < d.Extent.ToM; s += step)
        {
            Vec3 place = d.CentreLine.MinBy(p => Math.Abs(d.ChainageAt(p) - s));
            Vec3 normal = (d.NormalAt(place) + (new Vec3(draws.NextNormal(), draws.NextNormal(), draws.NextNormal()) * 0.05)).Unit();
            double width = d.WidthAt(place), off = (d.SignedFromA(place) + d.SignedFromB(place)) / 2;
            windows.Add(new SlabWindow(place - o.Origin - (normal * (off + (0.1 * width * draws.NextNormal()))), normal, step, width * (1 + (0.1 * draws.NextNormal()))));
        }

        return new DikeBody { Dike = d.Number, Windows = [.. windows], Separation = 0.95, ByColour = true, MarginWanderM = 0.03 };
    }

    // A smooth random field of space: sum of waves a third to one metre long.
    private sealed class Wander
    {
        private const int Waves = 24;
        private readonly (Vec3 K, double Phase)[] waves = new (Vec3, double)[Waves];
        private readonly double size;

        public Wander(ulong seed, ulong item, double sigmaM)
        {
            var draws = new Draws(seed, Purpose + 1, item);
            size = sigmaM * Math.Sqrt(2.0 / Waves);
            for (int i = 0; i < Waves; i++)
            {
                Vec3 way = new Vec3(draws.NextNormal(), draws.NextNormal(), draws.NextNormal()).Unit();
                waves[i] = (way * (2 * Math.PI / (0.35 + (0.9 * draws.NextUnit()))), 2 * Math.PI * draws.NextUnit());
            }
        }

        public double At(Vec3 p)
        {
            double sum = 0;
            foreach ((Vec3 k, double phase) in waves) sum += Math.Cos(k.Dot(p) + phase);
            return sum * size;
        }
    }

    // Blobs of wrong labels, lichen and shade: one in two square metres or so, a decimetre or two across.
    private sealed class Islands
    {
        private readonly Dictionary<(int, int, int), List<(Vec3 P, double R)>> cells = [];

        public Islands(ulong seed, WorkingCloud cloud, double perM2)
        {
            int count = (int)(perM2 * cloud.Count * cloud.SpacingM * cloud.SpacingM * 0.5);
            for (int i = 0; i < count; i++)
            {
                var draws = new Draws(seed, Purpose + 2, (ulong)i);
                Vec3 p = cloud.Place(draws.NextBelow(cloud.Count));
                (int, int, int) key = Key(p);
                if (!cells.TryGetValue(key, out List<(Vec3 P, double R)>? list)) cells[key] = list = [];
                list.Add((p, 0.04 + (0.14 * draws.NextUnit())));
            }
        }

        public bool Holds(Vec3 p)
        {
            (int x, int y, int z) = Key(p);
            for (int k = 0; k < 27; k++)
            {
                if (cells.TryGetValue((x + (k % 3) - 1, y + (k / 3 % 3) - 1, z + (k / 9) - 1), out List<(Vec3 P, double R)>? list) && list.Any(b => (b.P - p).Length < b.R)) return true;
            }

            return false;
        }

        private static (int, int, int) Key(Vec3 p) => ((int)Math.Floor(p.X / 0.2), (int)Math.Floor(p.Y / 0.2), (int)Math.Floor(p.Z / 0.2));
    }
}
