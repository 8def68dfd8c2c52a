using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Classes;

/// <summary>A body that has the shape of a dike: a slab between two sub-parallel margins, longer than wide.</summary>
public sealed record DikeBody
{
    /// <summary>1, 2, ... in order of exposed area.</summary>
    public int Dike { get; init; }

    /// <summary>The slab piece by piece along strike, in order of increasing chainage.</summary>
    public SlabWindow[] Windows { get; init; } = [];

    /// <summary>Scatter of the margins about the slab [m]: small for real margins.</summary>
    public double MarginWanderM { get; init; }

    /// <summary>How well the inside differs from the outside, held out: 0.5 none, 1 perfect.</summary>
    public double Separation { get; init; }

    /// <summary>True when colour carried the decision, false when texture alone did.</summary>
    public bool ByColour { get; init; }
}
