using CloudStruct.Records.Classes;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Classify;

/// <summary>Tells dike, host, cover and loose rock apart, by colour and texture, and finds the bodies that have a dike's shape.</summary>
/// <remarks>Slabs are searched first and appearance is learnt from them: without a shape no mixture of colours knows which
/// of its parts is a dike. docs/methods-classes.md gives formulas, sources and measured figures.</remarks>
public sealed class ClassifyStage : IStage<ClassifyInput, ClassifySettings, ClassifiedCloud>
{
    private const double LeastPatchM = 0.045, LeastDikeM = 0.25;

    /// <summary>A separate piece of cloud smaller than this cannot be told to be in place [m²].</summary>
    private const double LoosePieceM2 = 2;

    /// <inheritdoc/>
    public string Name => "classify";

    /// <inheritdoc/>
    public ClassifiedCloud Run(ClassifyInput input, ClassifySettings settings, StageContext context)
    {
        DescribedCloud described = input.Described;
        int n = described.Cloud.Count;
        if (n == 0) return new ClassifiedCloud();
        double patchM = settings.PatchM ?? Math.Max(LeastPatchM, 2 * described.Cloud.SpacingM);
        Patches patches = Patches.Build(described, patchM, context);
        PatchLabels labels = PatchLabels.Of(described, patches, settings.UseLabels ? input.Labels : input.Labels with
        {
            Points = [.. input.Labels.Points.Where(p => p.Use != LabelUse.Train)],
            Polygons = [.. input.Labels.Polygons.Where(p => p.Use != LabelUse.Train)],
        });
        Features features = Features.Of(patches, context);
        context.Progress(0.2);
        byte[] kind = Kinds(patches, features, settings, labels, context);
        bool[] rock = [.. kind.Select(k => k == (byte)RockClass.Host)];
        features.Standardise(patches, rock, context);
        context.Progress(0.4);

        double narrowest = settings.NarrowestDikeM ?? Math.Max(LeastDikeM, 6 * patches.SizeM), widest = settings.WidestDikeM ?? (Extent(described.Cloud) / 3);
        var finder = new DikeFinder(patches, features, rock, context);
        var drawing = new DikeDrawing(described, patches, features, rock, settings, labels, context);
        finder.Run(narrowest, widest, settings.MostDikes, labels, drawing);
        context.Progress(0.8);
        Outcome outcome = Gather(described, patches, kind, drawing.Kept);
        Mark(outcome, labels);
        context.Progress(0.95);
        double thinnest = Thinnest(outcome, narrowest, settings);
        Say(described, finder, outcome, narrowest, thinnest, context);
        return Record(described, labels, outcome, thinnest);
    }

    /// <summary>What is drawn so far: class, odds, and number of the dike per point; the dikes in order of area.</summary>
    private sealed record Outcome(byte[] Class, byte[] Probability, byte[] DikeOfPoint, List<Drawn> Dikes, double EvidencePerM2);

    /// <summary>Host for rock, Cover, or Loose or Unknown for small separate pieces, per patch.</summary>
    private static byte[] Kinds(Patches patches, Features features, ClassifySettings settings, PatchLabels labels, StageContext context)
    {
        var cover = new bool[patches.Count];
        var finder = new CoverFinder(patches, features, context);
        if (settings.FindCover && finder.LogOdds() is { } odds)
        {
            Outline(odds);
            int rims = (int)Math.Ceiling(1 / patches.SizeM);
            if (cover.Contains(true) && finder.Again(cover, rims) is { } better)
            {
                bool[] reach = PatchCut.Grown(patches, cover, rims);
                for (int i = 0; i < better.Length; i++)
                {
                    if (!reach[i]) better[i] = -3;
                }

                Outline(better);
            }
        }

        void Outline(float[] by)
        {
            // Only where cover is near at hand does the cut have to look.
            bool[] active = PatchCut.Grown(patches, [.. by.Select(o => o > -0.5f)], 3);
            Array.Clear(cover);
            PatchCut.Run(patches, by, active, cover, [.. active.Select(a => !a)], settings.SmoothingPerM);
            DropSpecks(patches, cover);
        }

        var kind = new byte[patches.Count];
        for (int i = 0; i < kind.Length; i++)
        {
            kind[i] = (byte)(cover[i] ? RockClass.Cover : RockClass.Host);
            if (labels.Train.Length > 0 && labels.Train[i] is (byte)RockClass.Cover or (byte)RockClass.Loose) kind[i] = labels.Train[i];
        }

        SeparatePieces(patches, kind);
        return kind;
    }

    /// <summary>Cover smaller than this is lichen or a tuft in a crack: the rock is still seen there.</summary>
    private static void DropSpecks(Patches patches, bool[] cover)
    {
        const double SpeckM2 = 0.3;
        foreach ((List<int> piece, double area) in Pieces(patches, cover))
        {
            if (area >= SpeckM2) continue;
            foreach (int i in piece) cover[i] = false;
        }
    }

    /// <summary>Connected pieces of the patches asked for, in order of their first patch; patches whose cells touch belong together.</summary>
    private static IEnumerable<(List<int> Piece, double AreaM2)> Pieces(Patches patches, bool[] of)
    {
        var seen = new bool[patches.Count];
        var stack = new Stack<int>();
        for (int start = 0; start < seen.Length; start++)
        {
            if (seen[start] || !of[start]) continue;
            var piece = new List<int>();
            double area = 0;
            seen[start] = true;
            stack.Push(start);
            while (stack.Count > 0)
            {
                int i = stack.Pop();
                piece.Add(i);
                area += patches.AreaM2[i];
                foreach (int j in patches.Around(i))
                {
                    if (seen[j] || !of[j]) continue;
                    seen[j] = true;
                    stack.Push(j);
                }
            }

            yield return (piece, area);
        }
    }

    /// <summary>Marks small pieces of cloud that touch nothing else: loose when large enough to be a block, else unknown.</summary>
    private static void SeparatePieces(Patches patches, byte[] kind)
    {
        double all = 0;
        foreach (float a in patches.AreaM2) all += a;
        double limit = Math.Min(LoosePieceM2, 0.01 * all);
        int[] piece = SeparateClouds.Of(patches.Cell);
        var area = new double[patches.Count];
        for (int i = 0; i < piece.Length; i++) area[piece[i]] += patches.AreaM2[i];
        for (int i = 0; i < piece.Length; i++)
        {
            if (area[piece[i]] < limit && kind[i] == (byte)RockClass.Host) kind[i] = (byte)(area[piece[i]] > 0.05 ? RockClass.Loose : RockClass.Unknown);
        }
    }

    /// <summary>Class, odds and number of the dike per point, from what was drawn.</summary>
    private static Outcome Gather(DescribedCloud described, Patches patches, byte[] kind, List<Drawn> drawn)
    {
        int n = described.Cloud.Count;
        byte[] classes = new byte[n], probability = new byte[n], dikeOf = new byte[n];
        for (int i = 0; i < n; i++) classes[i] = kind[patches.OfPoint[i]];
        var areas = new List<double>();
        double evidence = 0, evidenceArea = 0;
        for (int d = 0; d < drawn.Count; d++)
        {
            Drawn one = drawn[d];
            double area = 0;
            for (int i = 0; i < n; i++)
            {
                int p = patches.OfPoint[i];
                if (kind[p] == (byte)RockClass.Host && one.Odds[p] != 0 && dikeOf[i] == 0) probability[i] = Math.Max(probability[i], Probability(one.Odds[p], one.Say[i]));
                if (!one.Say[i]) continue;
                classes[i] = (byte)RockClass.Dike;
                dikeOf[i] = (byte)(d + 1);
                area += described.AreaM2[i];
                evidence += Math.Clamp(one.Odds[p], 0, Appearance.Clip) * described.AreaM2[i];
                evidenceArea += described.AreaM2[i];
            }

            areas.Add(area);
        }

        // Numbers in order of exposed area.
        int[] order = [.. Enumerable.Range(0, drawn.Count).OrderByDescending(d => areas[d]).ThenBy(d => d)];
        var number = new byte[drawn.Count + 1];
        for (int k = 0; k < order.Length; k++) number[order[k] + 1] = (byte)(k + 1);
        for (int i = 0; i < n; i++) dikeOf[i] = number[dikeOf[i]];
        double perM2 = (evidenceArea > 0 ? evidence / evidenceArea : 0.5 * Appearance.Clip) / SheetFitter.IndependentM2;
        return new Outcome(classes, probability, dikeOf, [.. order.Select(d => drawn[d])], perM2);
    }

    /// <summary>The odds of a patch, drawn to the side of the cut that the point came to lie on.</summary>
    private static byte Probability(float odds, bool inside)
    {
        double p = 1 / (1 + Math.Exp(-(odds + (inside ? 1.5 : -1.5))));
        return (byte)Math.Round(255 * p);
    }

    private static void Mark(Outcome outcome, PatchLabels labels)
    {
        for (int i = 0; i < labels.Ignored.Length; i++)
        {
            if (!labels.Ignored[i]) continue;
            outcome.Class[i] = (byte)RockClass.Unknown;
            outcome.Probability[i] = outcome.DikeOfPoint[i] = 0;
        }
    }

    /// <summary>By the smoothing law: a strip survives when its width times the evidence per area exceeds two boundaries.</summary>
    private static double Thinnest(Outcome outcome, double narrowest, ClassifySettings settings) =>
        Math.Max(narrowest, 2 * settings.SmoothingPerM / Math.Max(1, outcome.EvidencePerM2));

    private static double Extent(WorkingCloud cloud)
    {
        float[] x = cloud.X, y = cloud.Y, z = cloud.Z;
        double dx = x.Max() - x.Min(), dy = y.Max() - y.Min(), dz = z.Max() - z.Min();
        return Math.Max(dx, Math.Max(dy, dz));
    }

    private void Say(DescribedCloud described, DikeFinder finder, Outcome outcome, double narrowest, double thinnest, StageContext context)
    {
        if (!described.Cloud.HasColour) context.Say(new Remark(Name, "The cloud has no colour: rock and cover are told apart by texture alone, and texture alone is not trusted to show a dike, so none can be reported.", true));
        if (outcome.Dikes.Count == 0)
        {
            DikeJudgement? best = finder.Looked.Select(l => l.Judgement).OrderByDescending(j => Math.Max(j.ColourAuc, j.TextureAuc)).FirstOrDefault();
            string nearest = best == null ? "no slab stood out from the rock beside it"
                : Invariant($"the likeliest of {finder.Looked.Count} slabs looked at was {best.WidthM:0.0} m wide, its margins wander by {best.WanderM:0.00} m, and its rock differs from that beside it with a separation of {Math.Max(best.ColourAuc, best.TextureAuc):0.00} (1 is perfect)");
            context.Say(new Remark(Name, Invariant($"Nothing has the shape of a dike: {nearest}. A dike thinner than {thinnest:0.00} m would have been missed."), false));
        }

        for (int d = 0; d < outcome.Dikes.Count; d++)
        {
            if (outcome.Dikes[d].Dike.ByColour || !described.Cloud.HasColour) continue;
            context.Say(new Remark(Name, $"Dike {d + 1} is told from its host by texture, not by colour: its margins are less certain.", true));
        }
    }

    private static ClassifiedCloud Record(DescribedCloud described, PatchLabels labels, Outcome outcome, double thinnest)
    {
        ConfusionMatrix? check = labels.Checks ? Judgement.Confusion(labels.Check, outcome.Class) : null;
        return new ClassifiedCloud
        {
            Class = outcome.Class,
            DikeProbability = outcome.Probability,
            DikeOfPoint = outcome.DikeOfPoint,
            Dikes =
            [
                .. outcome.Dikes.Select((d, k) => new DikeBody
                {
                    Dike = k + 1, Windows = d.Dike.Sheet.Windows(), MarginWanderM = d.ScatterM,
                    Separation = Math.Max(d.Dike.Judgement.ColourAuc, d.Dike.Judgement.TextureAuc), ByColour = d.Dike.ByColour,
                }),
            ],
            ThinnestDikeM = thinnest,
            Summary = Judgement.Summary(described, outcome.Class, check),
            Check = check,
            UsedColour = described.Cloud.HasColour,
        };
    }
}
