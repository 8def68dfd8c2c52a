using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Comparing;

/// <summary>Two measurements of one outcrop held against each other.</summary>
public sealed record ComparisonRecord
{
    /// <summary>File stem: repeat or fieldcheck.</summary>
    public required string Name { get; init; }

    /// <summary>Title of the figure.</summary>
    public required string Title { get; init; }

    /// <summary>Pairs, those of faces first.</summary>
    public ComparedPair[] Pairs { get; init; } = [];

    /// <summary>What had no partner, by kind: in the first, in the second.</summary>
    public (string Kind, int First, int Second)[] Alone { get; init; } = [];

    /// <summary>How often regions held.</summary>
    public ComparedGroup[] Groups { get; init; } = [];

    /// <summary>Tests of common means.</summary>
    public ComparedMean[] Means { get; init; } = [];

    /// <summary>Turn of the second against the first; null when too few attitudes fix it.</summary>
    public RotationFound? Rotation { get; init; }

    /// <summary>Shift of the second against the first that was taken off before pairing [m]; null when none was sought.</summary>
    public Vec3? ShiftM { get; init; }

    /// <summary>Name of the figure's axis.</summary>
    public string Axis { get; init; } = "";

    /// <summary>Distribution of the differences and what the stated regions predict.</summary>
    public ShareCurve[] Curves { get; init; } = [];

    /// <summary>What was found, in sentences.</summary>
    public string[] Sentences { get; init; } = [];
}
