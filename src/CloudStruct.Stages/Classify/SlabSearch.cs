using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Mixtures;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Stages;

namespace CloudStruct.Stages.Classify;

/// <summary>Looks for slabs over poles some degrees apart, in cubic windows of several sizes.</summary>
/// <remarks>A slab is compared with flanks of its own width on each side: the products of the two differences, so that a
/// gradient (one flank brighter, one darker) counts against it and a plain inside-outside contrast counts for nothing when
/// one side looks alike. Windows grow with the width looked for, because a pole a few degrees off smears a long slab.</remarks>
internal sealed class SlabSearch
{
    /// <summary>Cells along the edge of a window.</summary>
    internal const int WindowCells = 48;

    /// <summary>Bins along a pole: the diagonal of the cube is 83 cells.</summary>
    internal const int Bins = 2 * WindowCells;

    /// <summary>Features looked at; the last lane carries the weight. Fewer than <see cref="Packed"/> columns share a vector with their squares.</summary>
    internal const int Lanes = 8, Packed = 4;

    /// <summary>Texture windows overlap for patches nearer than this: they count as one observation [m].</summary>
    private const double IndependentM = 0.35;

    private const double CoarseDeg = 11;

    private const int SlopeColumn = -1;

    /// <summary>Cosine of 15 deg: no slab flatter than that is looked for, a bed or a bench would be one.</summary>
    private static readonly double SteepestPole = Math.Cos(15 * Math.PI / 180);

    private static readonly int[] WidthCells = [3, 4, 5, 6, 8, 10, 12, 14, 16];

    private readonly Patches patches;
    private readonly Features features;
    private readonly StageContext context;

    public SlabSearch(Patches patches, Features features, StageContext context)
    {
        this.patches = patches;
        this.features = features;
        this.context = context;
    }

    /// <summary>The best slabs of all windows, strongest first.</summary>
    /// <param name="use">Weight per patch [m²]; 0 for what is no rock or already taken.</param>
    /// <param name="narrowestM">Narrowest slab [m].</param>
    /// <param name="widestM">Widest slab [m].</param>
    public List<SlabCandidate> Run(float[] use, double narrowestM, double widestM)
    {
        // Colour and texture speak apart: together, the stronger contrast of benches and walls in texture would drown a
        // dike that colour shows, and the other way round.
        List<SlabCandidate> byTexture = Run(use, colour: false, narrowestM, widestM);
        if (features.ColourColumns == 0) return byTexture;
        List<SlabCandidate> byColour = Run(use, colour: true, narrowestM, widestM), both = [];
        for (int i = 0; i < Math.Max(byColour.Count, byTexture.Count); i++)
        {
            if (i < byColour.Count) both.Add(byColour[i]);
            if (i < byTexture.Count) both.Add(byTexture[i]);
        }

        return both;
    }

    private List<SlabCandidate> Run(float[] use, bool colour, double narrowestM, double widestM)
    {
        float[] rows = SearchRows(use, colour, out int columns);
        var found = new List<SlabCandidate>();
        int[] of = features.Levels[0].OfFiner;
        for (int k = 0; k < features.Levels.Length; k++)
        {
            Level level = features.Levels[k];
            if (k > 0)
            {
                var coarser = new int[of.Length];
                for (int i = 0; i < of.Length; i++) coarser[i] = level.OfFiner[of[i]];
                of = coarser;
            }

            if (WidthCells[^1] * level.SizeM < narrowestM) continue;
            if (WidthCells[0] * level.SizeM > widestM) break;
            (float[] means, float[] weights) = level.Means(of, rows, columns, use);
            found.AddRange(Search(level, of, means, weights, columns, colour, narrowestM, widestM));
        }

        // Equal evidence is decided by place, so that the order never depends on anything else.
        found.Sort((a, b) => a.Evidence != b.Evidence ? b.Evidence.CompareTo(a.Evidence)
            : a.Middle.X != b.Middle.X ? a.Middle.X.CompareTo(b.Middle.X)
            : a.Middle.Y != b.Middle.Y ? a.Middle.Y.CompareTo(b.Middle.Y) : a.WidthM.CompareTo(b.WidthM));
        return found;
    }

    /// <summary>Unit vectors spread evenly over the upper half sphere (golden-angle spiral), without those within 15 deg of the vertical.</summary>
    internal static Vec3[] Poles(double stepDeg)
    {
        double step = stepDeg * Math.PI / 180;
        int n = (int)Math.Ceiling(2 * Math.PI / (step * step));
        var poles = new List<Vec3>();
        for (int i = 0; i < n; i++)
        {
            double z = (i + 0.5) / n, r = Math.Sqrt(1 - (z * z)), a = i * Math.PI * (3 - Math.Sqrt(5));
            if (z < SteepestPole) poles.Add(new Vec3(r * Math.Cos(a), r * Math.Sin(a), z));
        }

        return [.. poles];
    }

    /// <summary>The columns searched, whitened: equal variances and no correlation over the rock, within ±3.</summary>
    private float[] SearchRows(float[] use, bool colour, out int columns)
    {
        int c = features.ColourColumns, windows = (features.Columns - c - 1) / 3;
        // Texture comes after the slope of the ground, so that whitening leaves what slope does not explain.
        List<int> pick = colour ? [.. Enumerable.Range(0, c)] : [SlopeColumn, c];
        if (!colour && windows > 0) pick.Add(c + 3);
        if (!colour && windows > 1) pick.AddRange([c + 4, c + 6]);
        int d = columns = pick.Count;
        var mean = new double[d];
        var covariance = new double[d * d];
        double weight = 0;
        for (int i = 0; i < patches.Count; i++)
        {
            weight += use[i];
            for (int j = 0; j < d; j++) mean[j] += use[i] * Value(i, j);
        }

        for (int j = 0; j < d; j++) mean[j] /= weight;
        for (int i = 0; i < patches.Count; i++)
        {
            for (int j = 0; j < d; j++)
            {
                for (int k = 0; k <= j; k++) covariance[(j * d) + k] += use[i] / weight * (Value(i, j) - mean[j]) * (Value(i, k) - mean[k]);
            }
        }

        for (int j = 0; j < d; j++) covariance[(j * d) + j] += 1e-3;
        Cholesky.Factor(covariance, d);
        var rows = new float[(long)patches.Count * d];
        BlockParallel.For(patches.Count, context.Threads, context.Stop, (from, to) =>
        {
            Span<double> v = stackalloc double[d];
            for (int i = from; i < to; i++)
            {
                for (int j = 0; j < d; j++) v[j] = Value(i, j) - mean[j];
                Cholesky.Whiten(covariance, d, v);
                for (int j = 0; j < d; j++) rows[(i * d) + j] = (float)Math.Clamp(v[j], -3, 3);
            }
        });
        return rows;

        double Value(int i, int j) => pick[j] == SlopeColumn ? Slope(i) : Math.Clamp(features.Rows[(i * features.Columns) + pick[j]], -4, 4);
    }

    private double Slope(int i) => float.IsFinite(features.Level06[i]) ? 5 * (features.Level06[i] - 0.7) : 0;

    private IEnumerable<SlabCandidate> Search(Level level, int[] of, float[] means, float[] weights, int columns, bool colour, double narrowestM, double widestM)
    {
        int n = level.Count, half = WindowCells / 2;
        // Middles of the cells from the patches they hold.
        var middle = new float[3 * n];
        var held = new float[n];
        var facing = new System.Numerics.Vector3[n];
        for (int i = 0; i < of.Length; i++)
        {
            float w = patches.AreaM2[i] + 1e-9f;
            held[of[i]] += w;
            middle[3 * of[i]] += w * patches.X[i];
            middle[(3 * of[i]) + 1] += w * patches.Y[i];
            middle[(3 * of[i]) + 2] += w * patches.Z[i];
            facing[of[i]] += w * patches.Normal[i];
        }

        for (int i = 0; i < 3 * n; i++) middle[i] /= held[i / 3];
        var blockMap = new CellMap(Math.Max(16, n / 50));
        var members = new List<List<int>>();
        var corners = new List<(int X, int Y, int Z)>();
        for (int i = 0; i < n; i++)
        {
            if (weights[i] == 0) continue;
            int x = Floor(level.Cell[3 * i], half), y = Floor(level.Cell[(3 * i) + 1], half), z = Floor(level.Cell[(3 * i) + 2], half);
            int b = blockMap.FindOrAdd(x, y, z);
            if (b == members.Count)
            {
                members.Add([]);
                corners.Add((x, y, z));
            }

            members[b].Add(i);
        }

        var windowMap = new CellMap(8 * Math.Max(16, members.Count));
        var windows = new List<List<int>>();
        foreach ((int x, int y, int z) in corners)
        {
            for (int k = 0; k < 8; k++)
            {
                int wx = x - (k & 1), wy = y - ((k >> 1) & 1), wz = z - (k >> 2);
                if (windowMap.FindOrAdd(wx, wy, wz) < windows.Count) continue;
                var cells = new List<int>();
                for (int j = 0; j < 8; j++)
                {
                    int b = blockMap.Find(wx + (j & 1), wy + ((j >> 1) & 1), wz + (j >> 2));
                    if (b >= 0) cells.AddRange(members[b]);
                }

                windows.Add(cells);
            }
        }

        Vec3[] poles = Poles(CoarseDeg);
        var best = new SlabCandidate[windows.Count][];
        BlockParallel.For(
            windows.Count,
            context.Threads,
            context.Stop,
            () => new SlabBins(),
            (from, to, scratch) =>
            {
                for (int w = from; w < to; w++) best[w] = SearchWindow(windows[w], middle, facing, means, weights, columns, colour, level.SizeM, poles, narrowestM, widestM, scratch);
            },
            length: 1);
        return best.SelectMany(b => b);
    }

    private static int Floor(int a, int b) => (int)Math.Floor((double)a / b);

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static SlabCandidate[] SearchWindow(
        List<int> cells, float[] middle, System.Numerics.Vector3[] facing, float[] means, float[] weights, int columns, bool colour, double cellM, Vec3[] poles, double narrowestM, double widestM, SlabBins scratch)
    {
        int n = cells.Count;
        if (n < 250) return [];
        scratch.Hold(n);
        Vec3 centre = default;
        var face = System.Numerics.Vector3.Zero;
        foreach (int i in cells)
        {
            centre += new Vec3(middle[3 * i], middle[(3 * i) + 1], middle[(3 * i) + 2]);
            face += facing[i];
        }

        centre /= n;
        face /= face.Length() + 1e-12f;
        double cellArea = cellM * cellM;
        bool packed = columns < Packed;
        Span<float> row = stackalloc float[Lanes];
        for (int k = 0; k < n; k++)
        {
            int i = cells[k];
            // Every cell counts once at most: area beyond a full cell (folded surface) adds no new view of the rock.
            float w = (float)Math.Min(1, weights[i] / cellArea);
            row.Clear();
            for (int c = 0; c < columns; c++) row[c] = means[(i * columns) + c];
            row[packed ? Packed - 1 : Lanes - 1] = 1;
            var v = Vector256.Create<float>(row);
            scratch.Weight[k] = w;
            scratch.First[k] = packed ? Vector256.Create(v.GetLower() * w, v.GetLower() * v.GetLower() * w) : v * w;
            if (!packed) scratch.Second[k] = v * v * w;
            scratch.X[k] = (float)(middle[3 * i] - centre.X);
            scratch.Y[k] = (float)(middle[(3 * i) + 1] - centre.Y);
            scratch.Z[k] = (float)(middle[(3 * i) + 2] - centre.Z);
        }

        float inverse = (float)(1 / cellM);
        double independent = Math.Min(1, Math.Pow(cellM / IndependentM, 2));
        var tops = new List<(double Evidence, double Contrast, Vec3 Pole, int From, int Width)>();
        // A coarse round over the half sphere, then finer ones about the best: a pole some degrees off smears a slab, but
        // still shows it.
        for (int p = 0; p < poles.Length; p++) Try(poles[p]);
        for (double step = 0.5 * CoarseDeg; step > 1; step /= 2)
        {
            tops.Sort(Order);
            foreach (Vec3 pole in Apart(tops, 0.94).Take(4).ToList())
            {
                Vec3 e1 = Math.Abs(pole.Z) < 0.9 ? pole.Cross(Vec3.Up).Unit() : pole.Cross(new Vec3(1, 0, 0)).Unit(), e2 = pole.Cross(e1);
                double tan = Math.Tan(step * Math.PI / 180);
                for (int k = 0; k < 6; k++)
                {
                    double angle = k * Math.PI / 3;
                    Vec3 near = (pole + (e1 * (tan * Math.Cos(angle))) + (e2 * (tan * Math.Sin(angle)))).Unit();
                    if (Math.Abs(near.Z) < SteepestPole) Try(near);
                }
            }
        }

        void Try(Vec3 pole)
        {
            scratch.Bin((float)pole.X * inverse, (float)pole.Y * inverse, (float)pole.Z * inverse, n, packed);
            (double Evidence, double Contrast, int From, int Width) top = default;
            foreach (int width in WidthCells)
            {
                double widthM = width * cellM;
                if (widthM < 0.8 * narrowestM || widthM > 1.2 * widestM) continue;
                for (int from = 3; from + width + 3 <= Bins; from++)
                {
                    if (!scratch.Weighs(from, width, out float wi, out float wa, out float wb)) continue;
                    double contrast = packed ? scratch.PackedContrast(from, width, wi, wa, wb) : scratch.Contrast(from, width, wi, wa, wb, colour);
                    if (!(contrast > 0)) continue;
                    double effective = independent / ((1 / wi) + (0.5 / wa) + (0.5 / wb));
                    if (AtMost((float)effective, (float)contrast) < top.Evidence) continue;
                    double evidence = Math.Pow(effective, 0.35) * Math.Log(1 + contrast);
                    if (evidence > top.Evidence) top = (evidence, contrast, from, width);
                }
            }

            // Square to the ground before slanting, when both tell the same: on a pavement every dip fits.
            double square = 1 - Math.Abs(pole.Dot(new Vec3(face.X, face.Y, face.Z)));
            if (top.Evidence > 0) tops.Add((top.Evidence * (1 + (0.05 * square)), top.Contrast, pole, top.From, top.Width));
        }

        tops.Sort(Order);
        var kept = new List<SlabCandidate>();
        foreach ((double evidence, double contrast, Vec3 pole, int from, int width) in tops)
        {
            if (kept.Count == 3) break;
            double low = (from - WindowCells) * cellM, high = low + (width * cellM);
            Vec3 sum = default;
            double weight = 0;
            for (int k = 0; k < n; k++)
            {
                var q = new Vec3(scratch.X[k], scratch.Y[k], scratch.Z[k]);
                double t = pole.Dot(q);
                if (t < low || t >= high) continue;
                double w = scratch.Weight[k];
                sum += q * w;
                weight += w;
            }

            if (weight == 0) continue;
            Vec3 at = sum / weight;
            at += pole * (((low + high) / 2) - pole.Dot(at));
            var candidate = new SlabCandidate(at + centre, pole, high - low, WindowCells * cellM, contrast, evidence, colour);
            if (!kept.Exists(o => Alike(o, candidate))) kept.Add(candidate);
        }

        return [.. kept];
    }

    private static int Order(
        (double Evidence, double Contrast, Vec3 Pole, int From, int Width) a, (double Evidence, double Contrast, Vec3 Pole, int From, int Width) b) =>
        a.Evidence != b.Evidence ? b.Evidence.CompareTo(a.Evidence)
        : a.Pole.X != b.Pole.X ? a.Pole.X.CompareTo(b.Pole.X) : a.Pole.Y != b.Pole.Y ? a.Pole.Y.CompareTo(b.Pole.Y) : a.From.CompareTo(b.From);

    private static IEnumerable<Vec3> Apart(List<(double Evidence, double Contrast, Vec3 Pole, int From, int Width)> tops, double cosine)
    {
        var kept = new List<Vec3>();
        foreach ((_, _, Vec3 pole, _, _) in tops)
        {
            if (kept.Exists(o => Math.Abs(o.Dot(pole)) > cosine)) continue;
            kept.Add(pole);
            yield return pole;
        }
    }

    /// <summary>Whether two slabs are the same body seen twice: nearly parallel and overlapping.</summary>
    internal static bool Alike(SlabCandidate a, SlabCandidate b) =>
        Math.Abs(a.Normal.Dot(b.Normal)) > 0.9
        && Math.Abs(a.Normal.Dot(b.Middle - a.Middle)) < 0.6 * Math.Max(a.WidthM, b.WidthM)
        && (b.Middle - a.Middle).Length < 0.6 * Math.Max(a.WindowM, b.WindowM);

    /// <summary>No less than the evidence of a slab, from the bits of its numbers: seven slabs of eight need neither power nor logarithm.</summary>
    /// <remarks>The bits of a float, read as an integer, are its logarithm of base 2 up to 0.0861 (from below), and the other way round a
    /// power of 2 from above.</remarks>
    private static double AtMost(float effective, float contrast)
    {
        float power = UpperLog2(effective) * 0.35f, log = Math.Min(contrast, 0.69315f * UpperLog2(1 + contrast));
        return 1.001 * BitConverter.Int32BitsToSingle((int)((power + 127) * (1 << 23))) * log;

        static float UpperLog2(float x) => (BitConverter.SingleToInt32Bits(x) * (1f / (1 << 23))) - 126.913f;
    }
}
