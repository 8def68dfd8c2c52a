using CloudStruct.Records.Classes;
using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Chance;

namespace CloudStruct.Simulate.Rock;

/// <summary>Draws the rock of a plan: ground, joint sets, dikes, blocks, and what lies on them.</summary>
internal static class MassifMaker
{
    private const double HostPlacesPerM3 = 130, DikePlacesPerM3 = 420, SparseShare = 0.06, LowestM = -3.5, RimM = 0.8;

    /// <summary>Makes the rock.</summary>
    /// <returns>The solid, the mean poles of the host's joint sets, and those of the joint sets of each dike.</returns>
    public static (Massif Massif, Vec3[] HostPoles, Vec3[][] DikePoles) Make(OutcropPlan plan, ulong seed, int threads)
    {
        var terrain = new Terrain(plan, seed);
        var drape = new Drape(plan, terrain, seed);
        DikeSheet[] dikes = [.. plan.Dikes.Select((d, i) => PlaceDike(d, terrain, seed, i + 1))];
        JointTreeMaker.Set[] hostSets = [.. plan.HostJoints.Select((s, i) => DrawSet(s, terrain, seed, i))];
        JointTree host = JointTreeMaker.Make(
            hostSets, HostPlaces(terrain, dikes, seed), seed, Purpose.HostJoints, p => Stands(plan, terrain, drape, p, 0));
        var blocks = new JointTree[dikes.Length];
        var dikePoles = new Vec3[dikes.Length][];
        for (int i = 0; i < dikes.Length; i++)
        {
            DikeSheet dike = dikes[i];
            JointTreeMaker.Set[] sets = plan.Dikes[i].HostJoints ? hostSets : CoolingSets(dike, seed);
            dikePoles[i] = Upward(sets);
            blocks[i] = JointTreeMaker.Make(
                sets,
                DikePlaces(terrain, dike, seed),
                seed + (ulong)i,
                Purpose.DikeJoints,
                p => Stands(plan, terrain, drape, p, dike.ReliefM));
        }

        var whole = new SiteBox(0, terrain.LengthM, 0, terrain.BreadthM);
        GroundSheet[] sheets = plan.Planed
            ? [new GroundSheet(terrain, RockClass.Unknown, whole, 0.025, threads, (a, b) => PlanedHeight(terrain, host, dikes, blocks, a, b))]
            : [.. drape.Sheets(0.04, threads)];
        LooseBlock[] loose = [.. Fallen(plan, terrain, drape, seed)];
        return (new Massif(terrain, host, dikes, blocks, sheets, loose, plan.Planed), Upward(hostSets), dikePoles);
    }

    private static Vec3[] Upward(JointTreeMaker.Set[] sets) => [.. sets.Select(s => s.Pole.Z < 0 ? -s.Pole : s.Pole)];

    private static DikeSheet PlaceDike(DikePlan plan, Terrain terrain, ulong seed, int number)
    {
        double b = new Dice(seed, Purpose.Plan, 50 + (ulong)number).In(plan.Across) * terrain.BreadthM, a = terrain.LengthM / 2;
        return new DikeSheet(plan, seed, number, terrain.Place(a, b, terrain.Height(a, b)), terrain.UphillDeg, terrain.LengthM);
    }

    private static JointTreeMaker.Set DrawSet(JointSetPlan set, Terrain terrain, ulong seed, int index)
    {
        var dice = new Dice(seed, Purpose.Plan, (ulong)index);
        Vec3 pole = Axes.Pole(terrain.UphillDeg + dice.In(set.DipDirectionDeg), dice.In(set.DipDeg));
        return new(pole, dice.In(set.Kappa), dice.In(set.SpacingM), set.Law);
    }

    /// <summary>Cooling joints: along the margins, and two sets square to them and to each other.</summary>
    private static JointTreeMaker.Set[] CoolingSets(DikeSheet dike, ulong seed)
    {
        var dice = new Dice(seed, Purpose.Plan, 80 + (ulong)dike.Number);
        double spacing = dice.In(dike.Plan.JointSpacingM), turn = dice.Between(-15, 15) * Math.PI / 180;
        Vec3 along = (dike.Along * Math.Cos(turn)) + (dike.Up * Math.Sin(turn)), up = (dike.Up * Math.Cos(turn)) - (dike.Along * Math.Sin(turn));
        return
        [
            new(dike.Across, dice.In(dike.Plan.JointKappa), spacing * 1.25),
            new(along, dice.In(dike.Plan.JointKappa), spacing),
            new(up, dice.In(dike.Plan.JointKappa), spacing * 1.15),
        ];
    }

    private static bool Stands(OutcropPlan plan, Terrain terrain, Drape drape, Vec3 p, double reliefM)
    {
        if (plan.Planed) return true;
        (double a, double b) = terrain.Site(p);
        return p.Z < terrain.Height(a, b) + reliefM - drape.Lowering(a, b);
    }

    /// <summary>Random places in the host: dense near the surface, sparse elsewhere.</summary>
    private static Vec3[] HostPlaces(Terrain terrain, DikeSheet[] dikes, ulong seed)
    {
        var dice = new Dice(seed, Purpose.Samples);
        var places = new List<Vec3>();
        double area = (terrain.LengthM + (2 * RimM)) * (terrain.BreadthM + (2 * RimM)), height = terrain.TopM - LowestM;
        // Every place of a column is tried at the sparse density; its band near the surface at the full one.
        for (int i = (int)(area * HostPlacesPerM3 * SparseShare * height); i > 0; i--)
        {
            AddUnlessInDike(dikes, Anywhere(terrain, ref dice, LowestM, terrain.TopM), places);
        }

        const double columnM2 = 0.25;
        for (int i = (int)(area / columnM2); i > 0; i--)
        {
            double a = dice.Between(-RimM, terrain.LengthM + RimM), b = dice.Between(-RimM, terrain.BreadthM + RimM);
            (double low, double high) = Band(terrain, a, b);
            for (double left = (high - low) * HostPlacesPerM3 * columnM2; left > dice.Unit(); left--)
            {
                // Strewn about the column, not on one vertical line.
                double da = dice.Between(-0.3, 0.3), db = dice.Between(-0.3, 0.3);
                AddUnlessInDike(dikes, terrain.Place(a + da, b + db, dice.Between(low, high)), places);
            }
        }

        return [.. places];
    }

    private static Vec3 Anywhere(Terrain terrain, ref Dice dice, double low, double high) => terrain.Place(
        dice.Between(-RimM, terrain.LengthM + RimM), dice.Between(-RimM, terrain.BreadthM + RimM), dice.Between(low, high));

    private static void AddUnlessInDike(DikeSheet[] dikes, Vec3 p, List<Vec3> places)
    {
        if (!Array.Exists(dikes, d => d.Contains(p))) places.Add(p);
    }

    /// <summary>Random places in a dike: dense near the surface, sparse elsewhere.</summary>
    private static Vec3[] DikePlaces(Terrain terrain, DikeSheet dike, ulong seed)
    {
        var dice = new Dice(seed, Purpose.Samples, (ulong)dike.Number);
        var places = new List<Vec3>();
        double half = dike.HalfReachM, reach = (terrain.TopM - LowestM) / dike.Up.Z;
        (double lowW, double highW) = dike.AcrossM;
        for (int i = (int)(DikePlacesPerM3 * SparseShare * 2 * half * 2 * reach * (highW - lowW)); i > 0; i--)
        {
            AddIfInDike(terrain, dike, dike.Place(dice.Between(-half, half), dice.Between(-reach, reach), dice.Between(lowW, highW)), places);
        }

        const double columnM2 = 0.04;
        for (int i = (int)(2 * half * (highW - lowW) / columnM2); i > 0; i--)
        {
            // Along the dip to the ground, then strewn about it.
            double s = dice.Between(-half, half), w = dice.Between(lowW, highW), v = 0;
            for (int round = 0; round < 4; round++) v += Gap(terrain, dike.Place(s, v, w)) / dike.Up.Z;
            Vec3 ground = dike.Place(s, v, w);
            (double a, double b) = terrain.Site(ground);
            (double low, double high) = Band(terrain, a, b);
            for (double left = (high - low) / dike.Up.Z * DikePlacesPerM3 * columnM2; left > dice.Unit(); left--)
            {
                double up = (dice.Between(low, high) - ground.Z) / dike.Up.Z;
                Vec3 p = dike.Place(s + dice.Between(-0.12, 0.12), v + up, w + dice.Between(-0.12, 0.12));
                AddIfInDike(terrain, dike, p, places);
            }
        }

        return [.. places];
    }

    private static double Gap(Terrain terrain, Vec3 p)
    {
        (double a, double b) = terrain.Site(p);
        return terrain.Height(a, b) - p.Z;
    }

    private static void AddIfInDike(Terrain terrain, DikeSheet dike, Vec3 p, List<Vec3> places)
    {
        (double a, double b) = terrain.Site(p);
        if (p.Z < LowestM || p.Z > terrain.TopM || a < -RimM || b < -RimM || a > terrain.LengthM + RimM || b > terrain.BreadthM + RimM) return;
        if (dike.Contains(p)) places.Add(p);
    }

    /// <summary>Heights between which blocks can show.</summary>
    private static (double Low, double High) Band(Terrain terrain, double a, double b)
    {
        (double lowest, double highest) = terrain.HeightsWithin(a, b, 1.1);
        return (Math.Max(LowestM, lowest - 2), Math.Min(terrain.TopM, highest + 1.2));
    }

    /// <summary>Ice-worn surface: level blocks a centimetre or two apart in height, furrows along joints.</summary>
    private static double PlanedHeight(Terrain terrain, JointTree host, DikeSheet[] dikes, JointTree[] blocks, double a, double b)
    {
        Vec3 p = terrain.Place(a, b, terrain.Height(a, b));
        int rock = 0;
        for (int d = 0; d < dikes.Length; d++)
        {
            if (dikes[d].Contains(p)) rock = d + 1;
        }

        JointTree tree = rock == 0 ? host : blocks[rock - 1];
        Span<int> path = stackalloc int[64];
        int count = tree.Path(p, path);
        double nearest = 1;
        for (int k = 0; k < count; k++)
        {
            (Vec3 n, double offset) = tree.Plane(path[k]);
            double level = Math.Sqrt((n.X * n.X) + (n.Y * n.Y));
            if (level > 0.5) nearest = Math.Min(nearest, Math.Abs(n.Dot(p) - offset) / level);
        }

        double lot = (tree.BlockOf(tree.Find(p)).Lot & 0xFFFF) / 65536.0;
        double furrow = nearest < 0.06 ? 0.018 * (1 - (nearest / 0.06)) : 0;
        return p.Z + (0.016 * (lot - 0.5)) - furrow + (rock == 0 ? 0 : dikes[rock - 1].ReliefM);
    }

    private static IEnumerable<LooseBlock> Fallen(OutcropPlan plan, Terrain terrain, Drape drape, ulong seed)
    {
        int laid = 0;
        for (int i = 0; i < 40 * plan.LooseBlocks && laid < plan.LooseBlocks; i++)
        {
            var dice = new Dice(seed, Purpose.Loose, (ulong)i);
            double a = dice.Between(0, terrain.HighestStep.AtM), b = dice.Between(0.3, terrain.BreadthM - 0.3);
            if (drape.Scree(a, b) < dice.Between(0.1, 0.9)) continue;
            laid++;
            double size = 0.16 * Math.Exp(0.75 * Math.Abs(dice.Normal()));   // many small, few large
            yield return new LooseBlock(terrain.Place(a, b, terrain.Height(a, b) - 0.05), Math.Min(size, 1.1), dice);
        }
    }
}
