namespace CloudStruct.Accuracy.Deep;

/// <summary>What is asked of a plan, by the kind of outcrop it is.</summary>
/// <param name="Plan">Name of the plan.</param>
/// <param name="Iou">Dike IoU asked for; null where nothing is.</param>
/// <param name="ContactDeg">Median and 95th percentile of the contact error [deg]; null where nothing is asked.</param>
/// <param name="Width">Median and 95th percentile of the relative width error; null where nothing is asked.</param>
/// <param name="Outcrops">Outcrops of the deep study.</param>
/// <param name="Points">Points of each.</param>
public sealed record Family(string Plan, double? Iou = null, (double, double)? ContactDeg = null, (double, double)? Width = null, int Outcrops = 20, int Points = 300_000)
{
    /// <summary>First seed of the deep study; no rule was chosen with a look at these.</summary>
    public const ulong FirstSeed = 5000;

    private static readonly (double, double) ClearContact = (0.9, 4), LongContact = (1.5, 9), TextureContact = (3, 10);
    private static readonly (double, double) ClearWidth = (0.01, 0.03), LongWidth = (0.02, 0.08), TextureWidth = (0.05, 0.15);

    /// <summary>All families, in the order of the page. Plans that no figure is stated for are shown without one.</summary>
    public static Family[] All { get; } =
    [
        new("demo", 0.95, ClearContact, ClearWidth, Points: 600_000),
        new("two-dikes", 0.95, ClearContact, ClearWidth, Points: 400_000),
        new("tilted", 0.95, ClearContact, ClearWidth, Points: 400_000),
        new("long", 0.92, LongContact, LongWidth, Points: 500_000),
        new("bent", 0.92, LongContact, LongWidth, Points: 450_000),
        new("stepped", 0.92, LongContact, LongWidth, Points: 400_000),
        new("tapering", 0.92, LongContact, LongWidth, Points: 400_000),
        new("low-contrast", 0.88, TextureContact, TextureWidth, Points: 400_000),
        new("texture-only", 0.88, TextureContact, TextureWidth, Points: 250_000),
        new("crossing", Points: 400_000),
        new("tip"),
        new("thin", Points: 400_000),
        new("flat-lying"),
        new("stained"),
        new("scree"),
        new("tiles"),
        new("turned", Points: 200_000),
        new("south", Points: 250_000),
        new("wall", Points: 250_000),
        new("pavement", Points: 200_000),
        new("no-dike", Points: 200_000),
        new("gully", Points: 200_000),
        new("banded", Points: 200_000),
        new("shaded", Points: 200_000),
        new("faces-only", Points: 250_000),
        new("faces-smooth", Points: 250_000),
        new("random-joints", Points: 250_000),
        new("lognormal-joints", Points: 250_000),
        new("no-colour", Points: 250_000),
    ];

    /// <summary>What is asked of a plan; nothing of one that is not listed.</summary>
    public static Family Of(string plan) => Array.Find(All, f => f.Plan == plan) ?? new Family(plan);
}
