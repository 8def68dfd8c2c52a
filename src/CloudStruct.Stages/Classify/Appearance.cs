namespace CloudStruct.Stages.Classify;

/// <summary>Learns how the inside of a slab differs from its outside, and judges it on stretches that it did not learn from.</summary>
internal static class Appearance
{
    /// <summary>Largest log odds that one patch may claim: lichen and shade must not outvote the rest.</summary>
    public const float Clip = 3;

    /// <summary>Log odds inside : outside for the patches asked about: colour's plus texture's.</summary>
    /// <param name="features">Rows.</param>
    /// <param name="colour">Columns of colour; empty for none.</param>
    /// <param name="texture">Columns of texture; empty for none.</param>
    /// <param name="train">Patches with a side.</param>
    /// <param name="side">Side of each: 1 inside, 0 outside.</param>
    /// <param name="fold">Fold of each.</param>
    /// <param name="ask">Patches asked about.</param>
    /// <param name="askFold">Fold of each asked one: answered by what was learnt from the other folds; -1 by all.</param>
    /// <param name="folds">Number of folds; 1 for learning and asking on all.</param>
    /// <returns>Null when a side has too few patches.</returns>
    public static float[]? LogOdds(Features features, int[] colour, int[] texture, List<int> train, List<byte> side, List<int> fold, List<int> ask, List<int> askFold, int folds)
    {
        var odds = new float[ask.Count];
        if (colour.Length > 0 && !Add(odds, (leaveOut) => Looks.Learn(features, colour, train, side, fold, leaveOut, curved: true))) return null;
        if (texture.Length > 0 && !Add(odds, (leaveOut) => Looks.Learn(features, texture, train, side, fold, leaveOut, curved: false))) return null;
        for (int i = 0; i < odds.Length; i++) odds[i] = Math.Clamp(odds[i], -Clip, Clip);
        return odds;

        bool Add(float[] to, Func<int, Looks?> learn)
        {
            Looks? all = learn(-1);
            if (all == null) return false;
            var models = new Looks[folds + 1];
            for (int f = 0; f < folds; f++) models[f] = (folds > 1 ? learn(f) : null) ?? all;
            models[folds] = all;
            for (int i = 0; i < to.Length; i++) to[i] += models[folds == 1 || askFold[i] < 0 ? folds : askFold[i]].LogOdds(features, ask[i], Clip);
            return true;
        }
    }

    /// <summary>Chance that an inside patch has higher odds than an outside one (area under the curve).</summary>
    public static double Auc(List<float> inside, List<float> outside)
    {
        if (inside.Count == 0 || outside.Count == 0) return 0.5;
        inside.Sort();
        outside.Sort();
        double wins = 0;
        int below = 0, upTo = 0;
        foreach (float v in inside)
        {
            while (below < outside.Count && outside[below] < v) below++;
            if (upTo < below) upTo = below;
            while (upTo < outside.Count && outside[upTo] <= v) upTo++;
            wins += below + (0.5 * (upTo - below));
        }

        return wins / inside.Count / outside.Count;
    }
}
