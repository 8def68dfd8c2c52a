using CloudStruct.Maths.Blocks;

namespace CloudStruct.Stages.Classify;

/// <summary>How the inside of a slab differs from its outside, learnt on all stretches and on all but each fold, so that a stretch
/// can be judged by what was learnt elsewhere.</summary>
internal sealed class Appearance
{
    /// <summary>Largest log odds that one patch may claim: lichen and shade must not outvote the rest.</summary>
    public const float Clip = 3;

    private readonly Features features;
    private readonly Looks[][] models;   // per kind of column: a model per fold left out, and last the one of all
    private readonly int folds, threads;

    private Appearance(Features features, Looks[][] models, int folds, int threads)
    {
        this.features = features;
        this.models = models;
        this.folds = folds;
        this.threads = threads;
    }

    /// <summary>Learns colour and texture apart; their log odds are added.</summary>
    /// <param name="features">Rows.</param>
    /// <param name="colour">Columns of colour; empty for none.</param>
    /// <param name="texture">Columns of texture; empty for none.</param>
    /// <param name="sides">Patches with a side and a fold.</param>
    /// <param name="folds">Number of folds; 1 for learning and asking on all.</param>
    /// <param name="threads">Workers.</param>
    /// <returns>Null when a side has too few patches.</returns>
    public static Appearance? Learn(Features features, int[] colour, int[] texture, Sides sides, int folds, int threads)
    {
        var kinds = new List<Looks[]>();
        foreach ((int[] columns, bool curved) in ((int[], bool)[])[(colour, true), (texture, false)])
        {
            if (columns.Length == 0) continue;
            var learnt = new Looks?[folds + 1];
            BlockParallel.For(folds + 1, threads, CancellationToken.None, (from, _) =>
            {
                int leaveOut = folds - from - 1;   // the one of all first
                if (leaveOut >= 0 && folds == 1) return;
                learnt[folds - from - 1 < 0 ? folds : leaveOut] = Looks.Learn(features, columns, sides.Patch, sides.Side, sides.Fold, leaveOut, curved, threads);
            }, length: 1);
            if (learnt[folds] is not { } all) return null;
            kinds.Add([.. learnt.Select(l => l ?? all)]);
        }

        return new Appearance(features, [.. kinds], folds, threads);
    }

    /// <summary>Log odds inside : outside for the patches asked about: colour's plus texture's.</summary>
    /// <param name="ask">Patches asked about.</param>
    /// <param name="askFold">Fold of each: answered by what was learnt from the other folds.</param>
    public float[] LogOdds(int[] ask, int[] askFold)
    {
        var odds = new float[ask.Length];
        BlockParallel.For(ask.Length, threads, CancellationToken.None, () => new int[BlockParallel.Length], (from, to, picked) =>
        {
            ReadOnlySpan<int> patches = ask.AsSpan(from, to - from);
            Span<float> own = odds.AsSpan(from, to - from);
            foreach (Looks[] kind in models)
            {
                if (folds == 1)
                {
                    kind[folds].Add(features, patches, [], own, Clip);
                    continue;
                }

                for (int f = 0; f < folds; f++)
                {
                    int n = 0;
                    for (int i = from; i < to; i++)
                    {
                        if (askFold[i] == f) picked[n++] = i - from;
                    }

                    if (n > 0) kind[f].Add(features, patches, picked.AsSpan(0, n), own, Clip);
                }
            }

            for (int i = 0; i < own.Length; i++) own[i] = Math.Clamp(own[i], -Clip, Clip);
        });
        return odds;
    }
}
