using CloudStruct.Simulate.Chance;

namespace CloudStruct.Simulate;

/// <summary>What kind of outcrop to make. Ranges are drawn anew for each seed: a plan is a family, a seed is a member.</summary>
/// <remarks>Directions are given against the slope: 0 deg is uphill, 90 deg is right of it. The slope's own azimuth is drawn too.</remarks>
public sealed partial record OutcropPlan
{
    /// <summary>Name of the plan: "demo".</summary>
    public string Name { get; init; } = "demo";

    /// <summary>The invented place.</summary>
    public string Place { get; init; } = "Tarrow Cove";

    /// <summary>Points aimed at.</summary>
    public int Points { get; init; } = 1_000_000;

    /// <summary>Extent up the slope [m].</summary>
    public double LengthM { get; init; } = 25;

    /// <summary>Extent across the slope [m].</summary>
    public double BreadthM { get; init; } = 18;

    /// <summary>Grid azimuth of uphill [deg].</summary>
    public Span2 UphillDeg { get; init; } = new(0, 360);

    /// <summary>Steps of the terrain from the foot upward, cliffs among them.</summary>
    public StepPlan[] Steps { get; init; } = [];

    /// <summary>Rise of the benches between the steps [deg].</summary>
    public Span2 BenchSlopeDeg { get; init; } = new(3, 9);

    /// <summary>How far steps swing forth and back along their length, one standard deviation [m].</summary>
    public double StepWanderM { get; init; } = 0.9;

    /// <summary>Straight notch down the slope: its depth [m]; 0 for none.</summary>
    public Span2 GullyDepthM { get; init; }

    /// <summary>Width of the notch [m].</summary>
    public Span2 GullyWidthM { get; init; } = new(1.6, 2.6);

    /// <summary>Ice-worn: the surface is planed and only low steps stand out.</summary>
    public bool Planed { get; init; }

    /// <summary>Joint sets of the host.</summary>
    public JointSetPlan[] HostJoints { get; init; } = [];

    /// <summary>Look of the host.</summary>
    public RockLook HostLook { get; init; } = RockLook.Gneiss;

    /// <summary>Dikes; empty for none.</summary>
    public DikePlan[] Dikes { get; init; } = [];

    /// <summary>Straight dark stripes of colour in the host that are no dike, as many as given.</summary>
    public int Stains { get; init; }

    /// <summary>Soil and turf: places and sizes; empty for none.</summary>
    public CoverPlan[] Cover { get; init; } = [];

    /// <summary>Loose blocks at the foot of the largest step.</summary>
    public int LooseBlocks { get; init; } = 90;

    /// <summary>Share of upward block faces that are weathered bumpy and belong to no plane.</summary>
    public double WeatheredShare { get; init; } = 0.2;

    /// <summary>Radius of rounded block edges [m].</summary>
    public Span2 EdgeRadiusM { get; init; } = new(0.015, 0.03);

    /// <summary>Photogrammetric noise along the normal that neighbours share, one standard deviation [m].</summary>
    public Span2 NoiseM { get; init; } = new(0.005, 0.007);

    /// <summary>Distance at which the correlation of that noise has fallen to 1/e [m].</summary>
    public Span2 NoiseLengthM { get; init; } = new(0.05, 0.10);

    /// <summary>Noise of each point by itself, in each direction, one standard deviation [m].</summary>
    public Span2 WhiteNoiseM { get; init; } = new(0.0015, 0.0025);

    /// <summary>Share of stray points.</summary>
    public Span2 StrayShare { get; init; } = new(0.003, 0.005);

    /// <summary>Share of the rock under lichen.</summary>
    public Span2 LichenShare { get; init; } = new(0.06, 0.16);

    /// <summary>Whether points carry colour.</summary>
    public bool HasColour { get; init; } = true;

    /// <summary>Cameras of the flight, half of them looking down, half obliquely at the steps.</summary>
    public int Cameras { get; init; } = 14;

    /// <summary>Height of the sun [deg].</summary>
    public Span2 SunHeightDeg { get; init; } = new(28, 50);

    /// <summary>Where on earth it lies.</summary>
    public InventedSite Site { get; init; } = InventedSite.North;

    /// <summary>Clouds it comes in: 1, or 2 that overlap and differ in height by <see cref="DemoSurvey.TileOffsetM"/>.</summary>
    public int Tiles { get; init; } = 1;

    /// <summary>Standard deviation of the tilt of the whole model about each level axis [deg].</summary>
    public double ModelTiltSigmaDeg { get; init; }

    /// <summary>Standard deviation of the turn of the whole model about the vertical [deg].</summary>
    public double ModelTurnSigmaDeg { get; init; }
}
