using System.Runtime.InteropServices;
using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Mixtures;
using CloudStruct.Records.Stages;

namespace CloudStruct.Stages.Classify;

/// <summary>Tells plants and soil from rock: kinds of surface by a mixture, each kind judged against the rest of the scene.</summary>
/// <remarks>No limit is absolute: rock may be green-grey or brown. Plants are greener than the scene's rock or scatter like
/// leaves. Soil lies where it stays lying: hardly any of it is steep, though the scene has steep rock; and it differs
/// from rock in hue or is rougher at the size of a hand. Only what has a hue foreign to the rock, turf for one, may hang on walls.</remarks>
internal sealed class CoverFinder
{
    private const int MostItems = 4000;
    private const double SteepDeg = 52;

    /// <summary>Log-chromaticities (times 100) nearer than this are one colour in other light.</summary>
    private const double NearHue = 5;

    private readonly Patches patches;
    private readonly Features features;
    private readonly StageContext context;
    private bool[] hangs = [];

    public CoverFinder(Patches patches, Features features, StageContext context)
    {
        this.patches = patches;
        this.features = features;
        this.context = context;
    }

    /// <summary>Log odds cover : rock per patch; null when no kind of surface looks like cover. Call before the features are standardised.</summary>
    public float[]? LogOdds()
    {
        int colour = features.ColourColumns, d = colour > 0 ? 4 : 3;
        int stride = Math.Max(1, patches.Count / MostItems);
        var items = new List<double>();
        var index = new List<int>();
        Span<double> item = stackalloc double[d];
        for (int i = 0; i < patches.Count; i += stride)
        {
            if (!Item(i, item)) continue;
            items.AddRange(item);
            index.Add(i);
        }

        if (index.Count < 200) return null;
        double area = 0;
        foreach (float a in patches.AreaM2) area += a;
        double effective = Math.Clamp(area / 0.09, 100, index.Count);
        GaussianMixture? kinds = GaussianMixture.Choose(
            CollectionsMarshal.AsSpan(items), d, 7, CovarianceModel.Own, effective, context.Seed, starts: 1, rounds: 30, threads: context.Threads);
        if (kinds == null) return null;
        (bool[] cover, bool[] hanging) = Judge(kinds, items, index, d);
        if (!cover.Contains(true) || !cover.Contains(false)) return null;
        double limit = Math.Cos(SteepDeg * Math.PI / 180);
        var odds = new float[patches.Count];
        hangs = new bool[patches.Count];
        BlockParallel.For(patches.Count, context.Threads, context.Stop, (from, to) =>
        {
            Span<double> own = stackalloc double[d], logs = stackalloc double[kinds.Components];
            for (int i = from; i < to; i++)
            {
                if (!Item(i, own)) continue;
                kinds.LogDensities(own, logs);
                double yes = double.NegativeInfinity, no = double.NegativeInfinity, hang = double.NegativeInfinity;
                for (int c = 0; c < logs.Length; c++)
                {
                    if (hanging[c]) hang = LogSum(hang, logs[c]);
                    if (cover[c]) yes = LogSum(yes, logs[c]);
                    else no = LogSum(no, logs[c]);
                }

                double o = Math.Clamp(yes - no, -3, 3);
                hangs[i] = hang > LogSum(yes, no) - Math.Log(2);
                // Soil does not stay on a wall.
                if (features.Level06[i] < limit && !hangs[i]) o = Math.Min(o, 0) - 0.5;
                odds[i] = (float)o;
            }
        });
        return odds;
    }

    /// <summary>Log odds learnt anew from cover already outlined against rock well away from it: the first kinds miss what is
    /// half soil, half grass.</summary>
    /// <param name="cover">Patches outlined so far.</param>
    /// <param name="rims">Rings of patches about them that teach neither side.</param>
    public float[]? Again(bool[] cover, int rims)
    {
        bool[] near = PatchCut.Grown(patches, cover, rims);
        var train = new List<int>();
        var side = new List<byte>();
        int[] columns = [.. Enumerable.Range(0, Math.Min(4, features.Columns))];
        for (int i = 0; i < cover.Length; i++)
        {
            if ((near[i] && !cover[i]) || !Sound(i, columns.Length)) continue;
            train.Add(i);
            side.Add((byte)(cover[i] ? 1 : 0));
        }

        if (Looks.Learn(features, columns, CollectionsMarshal.AsSpan(train), CollectionsMarshal.AsSpan(side), [], -1, curved: true, context.Threads) is not { } looks) return null;
        var odds = new float[cover.Length];
        double limit = Math.Cos(SteepDeg * Math.PI / 180);
        BlockParallel.For(odds.Length, context.Threads, context.Stop, (from, to) =>
        {
            for (int i = from; i < to; i++)
            {
                float o = Sound(i, columns.Length) ? looks.LogOdds(features, i, 3) : 0;
                odds[i] = features.Level06[i] < limit && !hangs[i] ? Math.Min(o, 0) - 0.5f : o;
            }
        });
        return odds;
    }

    private bool Sound(int i, int columns)
    {
        foreach (float v in features.Rows.AsSpan(i * features.Columns, columns))
        {
            if (!float.IsFinite(v)) return false;
        }

        return true;
    }

    private static double LogSum(double a, double b)
    {
        double top = Math.Max(a, b);
        return double.IsNegativeInfinity(top) ? top : top + Math.Log(Math.Exp(a - top) + Math.Exp(b - top));
    }

    private bool Item(int i, Span<double> item)
    {
        ReadOnlySpan<float> row = features.Rows.AsSpan(i * features.Columns, features.Columns);
        int c = features.ColourColumns;
        bool sound = true;
        for (int j = 0; j < item.Length; j++)
        {
            // Colour and fine roughness; without colour fine roughness, rms and spread of the smallest window.
            item[j] = c > 0 ? row[j] : j == 0 ? row[0] : row[j == 1 ? 1 : 3];
            sound &= double.IsFinite(item[j]);
        }

        return sound;
    }

    private (bool[] Cover, bool[] Hanging) Judge(GaussianMixture kinds, List<double> items, List<int> index, int d)
    {
        int k = kinds.Components, c = features.ColourColumns;
        double limit = Math.Cos(SteepDeg * Math.PI / 180);
        var weight = new double[k];
        var steep = new double[k];
        Span<double> logs = stackalloc double[k];
        double allSteep = 0, all = 0;
        for (int i = 0; i < index.Count; i++)
        {
            double log = kinds.LogDensities(CollectionsMarshal.AsSpan(items).Slice(i * d, d), logs), a = patches.AreaM2[index[i]];
            bool isSteep = features.Level06[index[i]] < limit;
            all += a;
            if (isSteep) allSteep += a;
            for (int j = 0; j < k; j++)
            {
                double r = a * Math.Exp(logs[j] - log);
                weight[j] += r;
                if (isSteep) steep[j] += r;
            }
        }

        double sceneSteep = allSteep / all;
        // What the steep parts look like is rock: nothing else stays on them.
        double[] rock = RockMiddle(kinds, steep);
        double[] ratio = [.. Enumerable.Range(0, k).Select(j => weight[j] > 0 ? steep[j] / weight[j] / Math.Max(sceneSteep, 1e-6) : 1)];
        bool[] cover = new bool[k], hanging = new bool[k];
        for (int j = 0; j < k; j++)
        {
            double steepRatio = ratio[j];
            double[] mean = kinds.Means[(j * d)..((j + 1) * d)];
            // A dike or a bed may lie flat by chance; soil never stays on walls.
            bool flatLying = sceneSteep > 0.08 && steepRatio < 0.3;
            bool green = false, hue = false;
            int roughAt = c > 0 ? 3 : 0;
            double rougher = mean[roughAt] - rock[roughAt];
            if (c > 0)
            {
                double reds = mean[1] - rock[1], blues = mean[2] - rock[2];
                green = reds < -12 && blues < 0 && reds + mean[1] < -20;
                hue = blues < -15 && Math.Sqrt((reds * reds) + (blues * blues)) > 18;
            }

            // The worn crests of the rock are rough and flat too, but have a colour that the walls show as well.
            bool asOnWalls = c > 0 && Enumerable.Range(0, k).Any(o => ratio[o] >= 0.5 && SameHue(kinds, j, o, d));
            // A hue far from all that the walls show need not lie quite as flat: turf hangs over edges.
            bool foreign = hue && mean[2] - rock[2] < -30 && !asOnWalls && sceneSteep > 0.08 && steepRatio < 0.6;
            hanging[j] = green || foreign;
            cover[j] = green || foreign || (flatLying && (hue || (rougher > 0.7 && !asOnWalls))) || rougher > 1.6;
        }

        return (cover, hanging);
    }

    private static bool SameHue(GaussianMixture kinds, int a, int b, int d)
    {
        double reds = kinds.Means[(a * d) + 1] - kinds.Means[(b * d) + 1], blues = kinds.Means[(a * d) + 2] - kinds.Means[(b * d) + 2];
        return Math.Sqrt((reds * reds) + (blues * blues)) < NearHue;
    }

    private static double[] RockMiddle(GaussianMixture kinds, double[] steep)
    {
        int d = kinds.Dimensions;
        var middle = new double[d];
        double total = 0;
        for (int j = 0; j < kinds.Components; j++)
        {
            // On a scene without steep parts the weight of the kinds decides.
            double w = steep[j] + (1e-3 * kinds.Weights[j]);
            total += w;
            for (int e = 0; e < d; e++) middle[e] += w * kinds.Means[(j * d) + e];
        }

        for (int e = 0; e < d; e++) middle[e] /= total;
        return middle;
    }
}
