namespace CloudStruct.Stages.Classify;

/// <summary>Patches to learn from.</summary>
/// <param name="Patch">The patches.</param>
/// <param name="Side">Side of each: 1 inside, 0 outside.</param>
/// <param name="Fold">Fold of each, by stretches along strike.</param>
/// <param name="Place">Place of each in the corridor that it was taken from, rising.</param>
internal sealed record Sides(int[] Patch, byte[] Side, int[] Fold, int[] Place);
