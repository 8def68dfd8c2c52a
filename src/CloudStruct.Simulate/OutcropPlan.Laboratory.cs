namespace CloudStruct.Simulate;

/// <content>Outcrops that are meant to be nasty: each takes one thing that goes wrong on real rock and gives much of it.</content>
public sealed partial record OutcropPlan
{
    // Metre-thick bands of the host itself, as dark against pale as a dike: what sheets of colour look like that are no dike.
    private static readonly RockLook BroadBands = RockLook.Gneiss with { Banding = 0.32, BandM = 0.45 };

    private static IEnumerable<OutcropPlan> Laboratory(OutcropPlan bare, OutcropPlan demo)
    {
        JointSetPlan[] Spaced(SpacingLaw law) => [.. ThreeSets.Select(s => s with { Law = law })];
        return
        [
            bare with { Name = "banded", HostLook = BroadBands },
            bare with { Name = "shaded", GullyDepthM = new(1.6, 2.6), SunHeightDeg = new(12, 20) },
            bare with { Name = "random-joints", LooseBlocks = 0, HostJoints = Spaced(SpacingLaw.Random) },
            bare with { Name = "lognormal-joints", LooseBlocks = 0, HostJoints = Spaced(SpacingLaw.Lognormal) },
            demo with { Name = "stained", Stains = 2 },
            demo with { Name = "scree", LooseBlocks = 360 },
            demo with { Name = "stepped", Dikes = [new DikePlan { Taper = default, Jump = new(0.22, 0.4) }] },
            demo with { Name = "tapering", Dikes = [new DikePlan { Taper = new(0.3, 0.5) }] },
            demo with { Name = "tip", Dikes = [new DikePlan { TipAt = new(0.05, 0.25) }] },
            demo with { Name = "bent", LengthM = 40, Points = 1_500_000, Cameras = 20, Dikes = [new DikePlan { StrikeDeg = new(-8, 8), BendDeg = new(25, 45), Across = new(0.35, 0.65) }] },
            demo with { Name = "thin", Dikes = [new DikePlan { WidthM = new(0.35, 0.6) }] },
            demo with { Name = "flat-lying", Dikes = [new DikePlan { DipDeg = new(15, 35), StrikeDeg = new(60, 120), WidthM = new(1.2, 2.2) }] },
            demo with
            {
                Name = "crossing", BreadthM = 22,
                Dikes =
                [
                    new DikePlan { StrikeDeg = new(-32, -18), WidthM = new(1.4, 2.4) },
                    new DikePlan { StrikeDeg = new(18, 32), WidthM = new(1.2, 2.2) },
                ],
            },
            demo with { Name = "tiles", Tiles = 2 },
            demo with { Name = "turned", ModelTiltSigmaDeg = 0.8, ModelTurnSigmaDeg = 1.2 },
            demo with { Name = "south", Site = InventedSite.South },
            demo with { Name = "wall", LengthM = 14, Steps = [new(new(0.28, 0.36), new(9, 11), new(1.2, 2.2)), new(new(0.7, 0.78), new(1, 2), new(0.5, 1))] },
        ];
    }
}
