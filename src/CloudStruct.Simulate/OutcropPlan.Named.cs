using CloudStruct.Simulate.Chance;

namespace CloudStruct.Simulate;

/// <content>The plans that go by name.</content>
public sealed partial record OutcropPlan
{
    private static readonly StepPlan[] CliffAndBenches =
    [
        new(new(0.20, 0.28), new(5, 8), new(0.9, 1.6)),
        new(new(0.45, 0.52), new(1.0, 1.8), new(0.5, 1.0)),
        new(new(0.64, 0.72), new(1.4, 2.6), new(0.5, 1.0)),
        new(new(0.84, 0.90), new(0.5, 1.0), new(0.4, 0.8)),
    ];

    // A gently dipping set, one that faces out of the slope and one square to it, as cliffs have them.
    private static readonly JointSetPlan[] ThreeSets =
    [
        new(new(0, 360), new(4, 18), new(120, 300), new(0.55, 0.95)),
        new(new(155, 205), new(68, 88), new(90, 250), new(0.6, 1.1)),
        new(new(55, 105), new(72, 100), new(90, 250), new(0.7, 1.2)),
    ];

    private static readonly Dictionary<string, OutcropPlan> Named = MakeNamed();

    /// <summary>The names that <see cref="ByName"/> knows, in alphabetical order.</summary>
    public static IReadOnlyList<string> Names { get; } = [.. Named.Keys.Order(StringComparer.Ordinal)];

    /// <summary>A plan by its name.</summary>
    /// <exception cref="ArgumentException">When there is no such plan.</exception>
    public static OutcropPlan ByName(string name) => Named.TryGetValue(name, out OutcropPlan? plan)
        ? plan
        : throw new ArgumentException($"No outcrop plan is called {name}; there are {string.Join(", ", Names)}.", nameof(name));

    private static Dictionary<string, OutcropPlan> MakeNamed()
    {
        var bare = new OutcropPlan { Name = "no-dike", Steps = CliffAndBenches, HostJoints = ThreeSets };
        CoverPlan patch = new(new(0.56, 0.60), new(3.2, 4.2), new(0.46, 0.54), new(9, 12));
        OutcropPlan demo = bare with { Name = "demo", Dikes = [new DikePlan()], Cover = [patch] };
        OutcropPlan[] plans =
        [
            demo,
            bare,
            bare with { Name = "faces-only", LooseBlocks = 0 },
            bare with { Name = "faces-smooth", LooseBlocks = 0, WeatheredShare = 0, LichenShare = default },
            bare with { Name = "gully", GullyDepthM = new(1.2, 2.2), Stains = 3 },
            bare with
            {
                Name = "pavement", Planed = true, LooseBlocks = 0, BenchSlopeDeg = new(1, 4), StepWanderM = 0,
                Steps = [], Dikes = [new DikePlan { ReliefM = new(-0.03, 0.02) }],
            },
            demo with
            {
                Name = "two-dikes", BreadthM = 22,
                Dikes =
                [
                    new DikePlan { Across = new(0.26, 0.34), StrikeDeg = new(-12, 12), WidthM = new(1.5, 2.6) },
                    new DikePlan { Across = new(0.66, 0.74), StrikeDeg = new(-12, 12), WidthM = new(1.2, 2.2) },
                ],
            },
            demo with
            {
                Name = "long", LengthM = 60, BreadthM = 16, Points = 1_800_000, Cameras = 26,
                Steps =
                [
                    .. CliffAndBenches,
                    new(new(0.34, 0.40), new(0.8, 1.6), new(0.5, 1.0)),
                    new(new(0.75, 0.80), new(0.8, 1.6), new(0.5, 1.0)),
                ],
                Dikes =
                [
                    new DikePlan
                    {
                        StrikeDeg = new(-6, 6), BendDeg = new(6, 14), Taper = new(0.15, 0.3), Jump = new(0.15, 0.3),
                        InclusionShare = new(0.04, 0.09),
                    },
                ],
                Cover = [patch with { At = new(0.28, 0.32), LengthM = new(4, 6) }, patch with { At = new(0.66, 0.70), LengthM = new(3, 5) }],
            },
            demo with { Name = "low-contrast", Dikes = [new DikePlan { Look = RockLook.PaleDolerite }] },
            demo with { Name = "texture-only", Dikes = [new DikePlan { Look = RockLook.GneissColouredDolerite }], HostLook = RockLook.Gneiss with { Banding = 0 } },
            demo with { Name = "no-colour", HasColour = false },
            demo with { Name = "tilted", Dikes = [new DikePlan { DipDeg = new(50, 60) }] },
            .. Laboratory(bare, demo),
        ];
        return plans.ToDictionary(p => p.Name, StringComparer.Ordinal);
    }
}
