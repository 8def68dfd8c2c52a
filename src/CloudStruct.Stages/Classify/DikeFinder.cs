using CloudStruct.Records.Frame;
using CloudStruct.Records.Stages;

namespace CloudStruct.Stages.Classify;

/// <summary>Turns slab candidates into dikes: learns what is inside, follows the sheet along strike, and judges its shape.</summary>
internal sealed partial class DikeFinder
{
    /// <summary>Folds along strike: what is learnt on some stretches is judged on the others.</summary>
    private const int Folds = 3;

    private readonly Patches patches;
    private readonly Features features;
    private readonly bool[] rock;
    private readonly bool[] taken;
    private readonly StageContext context;
    private readonly int[] colour, texture;

    public DikeFinder(Patches patches, Features features, bool[] rock, StageContext context)
    {
        this.patches = patches;
        this.features = features;
        this.rock = rock;
        this.context = context;
        taken = new bool[patches.Count];
        int c = features.ColourColumns;
        colour = [.. Enumerable.Range(0, c)];
        texture = [.. Enumerable.Range(c, features.Columns - c)];
    }

    /// <summary>What was found of every candidate looked at, accepted or not, in the order of looking.</summary>
    public List<(DikeJudgement Judgement, bool Accepted)> Looked { get; } = [];

    /// <summary>Finds the dikes; those accepted are kept in the drawing, in the order they were accepted.</summary>
    /// <param name="narrowestM">Narrowest to look for.</param>
    /// <param name="widestM">Widest to look for.</param>
    /// <param name="most">Most dikes.</param>
    /// <param name="labels">Hand labels; may be empty.</param>
    /// <param name="drawing">Draws what has the shape of a dike, so that its margins can be looked at from near.</param>
    public void Run(double narrowestM, double widestM, int most, PatchLabels labels, DikeDrawing drawing)
    {
        var found = new List<FoundDike>();
        if (most == 0) return;
        var use = new float[patches.Count];
        for (int i = 0; i < use.Length; i++) use[i] = rock[i] ? patches.AreaM2[i] : 0;
        List<SlabCandidate> candidates = new SlabSearch(patches, features, context).Run(use, narrowestM, widestM);
        var tried = new List<SlabCandidate>();
        foreach (SlabCandidate candidate in candidates)
        {
            context.Stop.ThrowIfCancellationRequested();
            // Never stop at the first rejection: stains and benches may outrank the dike.
            if (found.Count == most || tried.Count == (features.ColourColumns > 0 ? 8 : 12) + (4 * found.Count)) break;
            if (tried.Exists(t => SlabSearch.Alike(t, candidate)) || found.Exists(d => Covers(d.Sheet, candidate))) continue;
            tried.Add(candidate);
            FoundDike? dike = Try(candidate, narrowestM, widestM, labels);
            if (dike == null) continue;
            Drawn drawn = drawing.Draw(dike);
            if (!(labels.Verdict(patches, dike.Sheet) ?? IsDike(dike.Judgement, drawn))) continue;
            drawing.Keep(drawn);
            found.Add(dike);
            for (int i = 0; i < taken.Length; i++)
            {
                if (dike.Sheet.Depth(patches.X[i], patches.Y[i], patches.Z[i]) > -0.1 * dike.Sheet.WidthM) taken[i] = true;
            }
        }
    }

    private static bool Covers(Sheet sheet, SlabCandidate candidate) =>
        sheet.Depth((float)candidate.Middle.X, (float)candidate.Middle.Y, (float)candidate.Middle.Z) > -0.8 * Math.Max(sheet.WidthM, candidate.WidthM)
        && Math.Abs(sheet.N.Dot(candidate.Normal)) > 0.7;

    private FoundDike? Try(SlabCandidate candidate, double narrowestM, double widestM, PatchLabels labels)
    {
        var sheet = new Sheet(candidate.Middle, candidate.Normal);
        double half = candidate.WindowM / 2;
        // Windows of texture reach half a metre over a margin: beside colour they only widen what colour shows sharply.
        int[] surface = candidate.ByColour ? [] : texture;
        sheet.Knots.Add(new Knot { S = 0, HalfM = half, A = -candidate.WidthM / 2, B = candidate.WidthM / 2 });
        for (int aim = 0; aim < 2; aim++)
        {
            Corridor corridor = CorridorOf(sheet, half);
            (List<int> train, List<byte> side, List<int> fold) = Sides(sheet, corridor, foldM: Math.Max(2, sheet.WidthM));
            float[]? odds = Appearance.LogOdds(features, colour, surface, train, side, fold, corridor.Patch, corridor.Fold, 1);
            if (odds == null || Tells(corridor, odds, train, side) < 0.65) return null;
            sheet = Aimed(sheet, corridor, odds);
        }

        for (int round = 0; round < 3; round++)
        {
            Corridor corridor = CorridorOf(sheet, round == 0 ? half : double.PositiveInfinity);
            (List<int> train, List<byte> side, List<int> fold) = Sides(sheet, corridor, foldM: Math.Max(2, sheet.WidthM));
            float[]? odds = Appearance.LogOdds(features, colour, surface, train, side, fold, corridor.Patch, corridor.Fold, 1);
            if (odds == null) return null;
            if (Tells(corridor, odds, train, side) < 0.7) return null;
            Follow(sheet, corridor, odds);
            // What shows its margins nowhere need not be learnt again.
            if (sheet.Knots.Count(k => k.BothMargins) < 0.3 * sheet.Knots.Count) return null;
            if (sheet.Knots.Count == 0 || !(sheet.WidthM >= narrowestM && sheet.WidthM <= 1.3 * widestM)) return null;
        }

        return Judge(sheet, labels);
    }

    /// <summary>Separation of the training sides by their own odds: too good by nature, so what fails it is nothing.</summary>
    private static double Tells(Corridor corridor, float[] odds, List<int> train, List<byte> side)
    {
        var place = new Dictionary<int, int>(corridor.Patch.Count);
        for (int i = 0; i < corridor.Patch.Count; i++) place[corridor.Patch[i]] = i;
        var inside = new List<float>();
        var outside = new List<float>();
        for (int i = 0; i < train.Count; i++) (side[i] == 1 ? inside : outside).Add(odds[place[train[i]]]);
        return Appearance.Auc(inside, outside);
    }

    private FoundDike? Judge(Sheet sheet, PatchLabels labels)
    {
        Corridor corridor = CorridorOf(sheet, double.PositiveInfinity);
        double width = sheet.WidthM;
        (List<int> train, List<byte> side, List<int> fold) = Sides(sheet, corridor, Math.Max(2, width));
        double textureAuc = HeldOut([], texture), colourAuc = colour.Length > 0 ? HeldOut(colour, []) : 0.5;
        float[] slopes = [.. train.Select(p => features.Level06[p])];
        double slopeAuc = Math.Max(Worse(slopes), Worse([.. slopes.Select(v => -v)]));
        bool byColour = colourAuc >= textureAuc - 0.05;
        float[]? odds = Appearance.LogOdds(features, byColour ? colour : [], byColour ? [] : texture, train, side, fold, corridor.Patch, corridor.Fold, Folds);
        if (odds == null) return null;
        odds = Averaged(corridor.Patch, odds);
        var fitter = corridor.Fitter(patches, odds);
        double wander = fitter.Wander(sheet, Math.Max(0.5, 0.2 * width));
        int both = sheet.Knots.Count(k => k.BothMargins);
        double length = both == 0 ? 0 : sheet.Knots.Where(k => k.BothMargins).Max(k => k.S + k.HalfM) - sheet.Knots.Where(k => k.BothMargins).Min(k => k.S - k.HalfM);
        var judgement = new DikeJudgement(width, length, wander, (double)both / sheet.Knots.Count, colourAuc, textureAuc, slopeAuc, WidthSpread(sheet));
        // A hand that has labelled dike and host knows better than the shape.
        bool accepted = labels.Verdict(patches, sheet) ?? IsPlausible(judgement);
        Looked.Add((judgement, accepted));
        return accepted ? new FoundDike(sheet, judgement, train, side, byColour) : null;

        // The worse of the two flanks: a bench edge or a bed differs from one side only.
        double HeldOut(int[] ofColour, int[] ofTexture)
        {
            float[]? o = Appearance.LogOdds(features, ofColour, ofTexture, train, side, fold, train, fold, Folds);
            return o == null ? 0.5 : Worse(Averaged(train, o));
        }

        double Worse(float[] o)
        {
            var inside = new List<float>();
            var flank = new[] { new List<float>(), new List<float>() };
            for (int i = 0; i < train.Count; i++)
            {
                if (side[i] == 1)
                {
                    inside.Add(o[i]);
                    continue;
                }

                (double s, double v, double t) = sheet.At(patches.X[train[i]], patches.Y[train[i]], patches.Z[train[i]]);
                (double a, double b) = sheet.Margins(s, v);
                flank[t < (a + b) / 2 ? 0 : 1].Add(o[i]);
            }

            return Math.Min(Appearance.Auc(inside, flank[0]), Appearance.Auc(inside, flank[1]));
        }
    }

    /// <summary>Odds averaged over each patch and its neighbours in the list: one lichen spot does not make an outlier.</summary>
    private float[] Averaged(List<int> list, float[] odds)
    {
        var place = new int[patches.Count];
        Array.Fill(place, -1);
        for (int i = 0; i < list.Count; i++) place[list[i]] = i;
        var mean = new float[odds.Length];
        Maths.Blocks.BlockParallel.For(list.Count, context.Threads, context.Stop, (from, to) =>
        {
            for (int i = from; i < to; i++)
            {
                int p = list[i], count = 0;
                float sum = 0;
                for (int k = 0; k < 27; k++)
                {
                    int j = patches.Map.Find(patches.Cell[3 * p] + (k % 3) - 1, patches.Cell[(3 * p) + 1] + (k / 3 % 3) - 1, patches.Cell[(3 * p) + 2] + (k / 9) - 1);
                    if (j < 0 || place[j] < 0) continue;
                    sum += odds[place[j]];
                    count++;
                }

                mean[i] = sum / count;
            }
        });
        return mean;
    }

    /// <summary>Distance of the tenth and ninetieth percentile of the widths, over their median.</summary>
    private static double WidthSpread(Sheet sheet)
    {
        double[] w = [.. sheet.Knots.Select(k => k.B - k.A).Order()];
        return (w[w.Length * 9 / 10] - w[w.Length / 10]) / w[w.Length / 2];
    }

    /// <summary>Worth drawing: long enough, both margins seen, and rock that differs.</summary>
    internal static bool IsPlausible(DikeJudgement j)
    {
        if (!(j.LengthM > 2 * j.WidthM) || !(j.BothMargins >= 0.4)) return false;
        // What the slope of the ground tells as well may be light and dirt on a wall, unless its margins are as sharp as rock's.
        if (!(j.SlopeAuc < 0.85 || j.WanderM <= Math.Max(0.05, 0.03 * j.WidthM))) return false;
        return j.ColourAuc >= 0.8;
    }

    /// <summary>The decision by the drawn outline: margins that run true and change of rock within a spacing or two.</summary>
    /// <remarks>Measured on simulated outcrops (spacing 4 to 5 cm): true dikes show 0.42 to 0.99 of their step of colour
    /// within 9 cm of margins that scatter by 2 to 7 cm, stains and gullies 0.07 to 0.37 at 6 to 18 cm, once 0.56
    /// at 12 cm. Contrast, length and straightness of a sheet do not part the two: stains reach a separation of 0.98.</remarks>
    internal static bool IsDike(DikeJudgement j, Drawn drawn)
    {
        // The rim of a stain fades over a share of its width: the narrower, the sharper it looks.
        double need = Math.Clamp(0.5 - (0.1 * (j.WidthM - 1)), 0.4, 0.5);
        if (!(drawn.Sharpness >= need) || !(drawn.ScatterM <= Math.Max(0.06, 0.03 * j.WidthM))) return false;
        // Less contrast is enough where the margins show along most of a long sheet; on a coarse cloud, whose wider strip beside the
        // margins holds more of a soft edge, they must then be sharper by as much.
        return j.ColourAuc >= 0.88 || (j.LengthM > 3 * j.WidthM && j.BothMargins >= 0.7 && drawn.Sharpness >= need * Math.Min(1.6, drawn.Widening));
    }
}
