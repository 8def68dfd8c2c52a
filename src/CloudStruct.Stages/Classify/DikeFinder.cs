using CloudStruct.Maths.Blocks;
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
            double beside = -0.1 * dike.Sheet.WidthM;
            BlockParallel.For(taken.Length, context.Threads, context.Stop, (from, to) =>
            {
                for (int i = from; i < to; i++) taken[i] |= dike.Sheet.Depth(patches.X[i], patches.Y[i], patches.Z[i]) > beside;
            });
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
            Corridor corridor = CorridorOf(sheet, OrderOf(sheet, half));
            Sides sides = SidesOf(sheet, corridor);
            float[]? odds = Appearance.Learn(features, colour, surface, sides, 1, context.Threads)?.LogOdds(corridor.Patch, corridor.Fold);
            if (odds == null || Tells(odds, sides) < 0.65) return null;
            sheet = Aimed(sheet, corridor, odds);
        }

        StrikeOrder? whole = null;
        for (int round = 0; round < 3; round++)
        {
            Corridor corridor = CorridorOf(sheet, round == 0 ? OrderOf(sheet, half) : whole ??= OrderOf(sheet, double.PositiveInfinity));
            Sides sides = SidesOf(sheet, corridor);
            float[]? odds = Appearance.Learn(features, colour, surface, sides, 1, context.Threads)?.LogOdds(corridor.Patch, corridor.Fold);
            if (odds == null) return null;
            if (Tells(odds, sides) < 0.7) return null;
            Follow(sheet, corridor, odds);
            // What shows its margins nowhere need not be learnt again.
            if (sheet.Knots.Count(k => k.BothMargins) < 0.3 * sheet.Knots.Count) return null;
            if (sheet.Knots.Count == 0 || !(sheet.WidthM >= narrowestM && sheet.WidthM <= 1.3 * widestM)) return null;
        }

        return Judge(sheet, whole!, labels);
    }

    /// <summary>Separation of the training sides by their own odds: too good by nature, so what fails it is nothing.</summary>
    private double Tells(float[] odds, Sides sides)
    {
        float[] inside = new float[sides.Patch.Length], outside = new float[sides.Patch.Length];
        int ins = 0, outs = 0;
        for (int i = 0; i < sides.Place.Length; i++)
        {
            if (sides.Side[i] == 1) inside[ins++] = odds[sides.Place[i]];
            else outside[outs++] = odds[sides.Place[i]];
        }

        float[][] both = [inside[..ins], outside[..outs]];
        BlockParallel.For(2, context.Threads, context.Stop, (from, _) => RankSeparation.Sort(both[from]), length: 1);
        return RankSeparation.Auc(both[0], both[1]);
    }

    private FoundDike? Judge(Sheet sheet, StrikeOrder order, PatchLabels labels)
    {
        Corridor corridor = CorridorOf(sheet, order);
        double width = sheet.WidthM;
        Sides sides = SidesOf(sheet, corridor);
        sbyte[] flanks = Flanks(sheet, corridor, sides);
        // Each stretch by what was learnt on the others. Odds by colour are asked of the whole corridor, where the margins are looked for too.
        Appearance? byColours = colour.Length > 0 ? Appearance.Learn(features, colour, [], sides, Folds, context.Threads) : null;
        Appearance? byTextures = Appearance.Learn(features, [], texture, sides, Folds, context.Threads);
        float[]? colourOdds = byColours?.LogOdds(corridor.Patch, corridor.Fold);
        double colourAuc = colourOdds == null ? 0.5 : Worse(Averaged(sides.Patch, [.. sides.Place.Select(p => colourOdds[p])]), flanks);
        double textureAuc = byTextures == null ? 0.5 : Worse(Averaged(sides.Patch, byTextures.LogOdds(sides.Patch, sides.Fold)), flanks);
        float[] slopes = [.. sides.Patch.Select(p => features.Level06[p])];
        double slopeAuc = Math.Max(Worse(slopes, flanks), Worse([.. slopes.Select(v => -v)], flanks));
        bool byColour = colourAuc >= textureAuc - 0.05;
        float[]? odds = byColour ? (colour.Length > 0 ? colourOdds : new float[corridor.Patch.Length]) : byTextures?.LogOdds(corridor.Patch, corridor.Fold);
        if (odds == null) return null;
        odds = Averaged(corridor.Patch, odds);
        SheetFitter fitter = corridor.Fitter(patches, odds, context.Threads);
        double wander = fitter.Wander(sheet, Math.Max(0.5, 0.2 * width));
        int both = sheet.Knots.Count(k => k.BothMargins);
        double length = both == 0 ? 0 : sheet.Knots.Where(k => k.BothMargins).Max(k => k.S + k.HalfM) - sheet.Knots.Where(k => k.BothMargins).Min(k => k.S - k.HalfM);
        var judgement = new DikeJudgement(width, length, wander, (double)both / sheet.Knots.Count, colourAuc, textureAuc, slopeAuc, WidthSpread(sheet));
        // A hand that has labelled dike and host knows better than the shape.
        bool accepted = labels.Verdict(patches, sheet) ?? IsPlausible(judgement);
        Looked.Add((judgement, accepted));
        return accepted ? new FoundDike(sheet, judgement, sides.Patch, sides.Side, byColour) : null;
    }

    /// <summary>Part of the sheet that each training patch lies in: -1 inside, 0 the flank of A, 1 that of B.</summary>
    private static sbyte[] Flanks(Sheet sheet, Corridor corridor, Sides sides)
    {
        var part = new sbyte[sides.Patch.Length];
        for (int i = 0; i < part.Length; i++)
        {
            int p = sides.Place[i];
            (double a, double b) = sheet.Margins(corridor.S[p], corridor.V[p]);
            part[i] = (sbyte)(sides.Side[i] == 1 ? -1 : corridor.T[p] < (a + b) / 2 ? 0 : 1);
        }

        return part;
    }

    /// <summary>Separation of the inside from the worse of the two flanks: a bench edge or a bed differs from one side only.</summary>
    private double Worse(float[] odds, sbyte[] parts)
    {
        var counts = new int[3];
        foreach (sbyte p in parts) counts[p + 1]++;
        float[][] samples = [new float[counts[0]], new float[counts[1]], new float[counts[2]]];
        Array.Clear(counts);
        for (int i = 0; i < parts.Length; i++) samples[parts[i] + 1][counts[parts[i] + 1]++] = odds[i];
        BlockParallel.For(3, context.Threads, context.Stop, (from, _) => RankSeparation.Sort(samples[from]), length: 1);
        return Math.Min(RankSeparation.Auc(samples[0], samples[1]), RankSeparation.Auc(samples[0], samples[2]));
    }

    /// <summary>Odds averaged over each patch and its neighbours in the list: one lichen spot does not make an outlier.</summary>
    private float[] Averaged(int[] list, float[] odds)
    {
        var place = new int[patches.Count];
        Array.Fill(place, -1);
        for (int i = 0; i < list.Length; i++) place[list[i]] = i;
        var mean = new float[odds.Length];
        BlockParallel.For(list.Length, context.Threads, context.Stop, (from, to) =>
        {
            for (int i = from; i < to; i++)
            {
                int p = list[i], count = 0;
                float sum = 0;
                foreach (int j in patches.Around(p))
                {
                    if (place[j] < 0) continue;
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
