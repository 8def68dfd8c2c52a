namespace CloudStruct.Stages.Classify;

/// <summary>A sheet that was taken for a dike, with what it was judged by and how its rock differs.</summary>
/// <param name="Sheet">Its shape.</param>
/// <param name="Judgement">Why it was taken.</param>
/// <param name="Train">Patches learnt from.</param>
/// <param name="Side">Their side: 1 inside.</param>
/// <param name="ByColour">True when colour carries the decision.</param>
internal sealed record FoundDike(Sheet Sheet, DikeJudgement Judgement, int[] Train, byte[] Side, bool ByColour);
