namespace CloudStruct.Records.Classes;

/// <summary>What the stage classify gives: a class and a probability per working point, and the dikes found.</summary>
public sealed record ClassifiedCloud
{
    /// <summary>Class per working point (values of <see cref="RockClass"/>).</summary>
    public byte[] Class { get; init; } = [];

    /// <summary>Probability of being dike rock, 0 to 255, per working point; all zero when there is no dike.</summary>
    public byte[] DikeProbability { get; init; } = [];

    /// <summary>Number of the dike a point belongs to (0 none), per working point.</summary>
    public byte[] DikeOfPoint { get; init; } = [];

    /// <summary>The dikes, in order of their numbers; empty when nothing has the shape of a dike.</summary>
    public DikeBody[] Dikes { get; init; } = [];

    /// <summary>Thinnest dike that the smoothing would have kept [m]; what is thinner may have been missed.</summary>
    public double ThinnestDikeM { get; init; }

    /// <summary>One row per class present.</summary>
    public ClassSummary[] Summary { get; init; } = [];

    /// <summary>Against check labels; null without them.</summary>
    public ConfusionMatrix? Check { get; init; }

    /// <summary>False when the cloud has no colour and only texture could speak.</summary>
    public bool UsedColour { get; init; }
}
