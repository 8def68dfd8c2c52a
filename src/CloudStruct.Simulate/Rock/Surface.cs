using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Chance;
using CloudStruct.Simulate.Views;

namespace CloudStruct.Simulate.Rock;

/// <summary>Turns what a camera sees into the real rock surface: worn edges, weathered tops, the grain of the rock.</summary>
internal sealed class Surface
{
    /// <summary>Beyond this the surface has left its plane: about the noise of one point.</summary>
    private const double OffPlaneM = 0.005;

    private const double LargestRadiusM = 0.06, CrackM = 0.012, CrackDepthM = 0.004;

    private readonly Massif massif;
    private readonly OutcropPlan plan;
    private readonly double edgeRadiusM;
    private readonly LatticeField bumps, pits, grain, chips;

    /// <summary>Draws the wear of an outcrop.</summary>
    public Surface(Massif massif, OutcropPlan plan, ulong seed)
    {
        this.massif = massif;
        this.plan = plan;
        edgeRadiusM = new Dice(seed, Purpose.Plan, 200).In(plan.EdgeRadiusM);
        bumps = new LatticeField(seed, 40, 0.16);
        pits = new LatticeField(seed, 41, 0.05);
        grain = new LatticeField(seed, 42, 0.03);
        chips = new LatticeField(seed, 43, 0.25);
    }

    /// <summary>Outward normal of the surface that was seen.</summary>
    public Vec3 NormalOf(Sight s)
    {
        switch (s.Kind)
        {
            case Hit.Kinds.Plane:
                Vec3 n = massif.Trees[s.Rock].Plane(s.Surface).Normal;
                return s.Back ? -n : n;
            case Hit.Kinds.Margin:
                DikeSheet dike = massif.Dikes[s.Surface / 2];
                (double along, double up, _) = dike.Inside(s.Place);
                Vec3 m = dike.MarginNormal(s.Surface % 2, along, up);
                return s.Back ? -m : m;
            case Hit.Kinds.Loose:
                return massif.Loose[s.Surface / 8].Sides[s.Surface % 8].Normal;
            default:
                return massif.Sheets[s.Surface].Normal(s.Place);
        }
    }

    /// <summary>What has become of the surface at a place that was seen.</summary>
    public Wear WearAt(Sight s, Vec3 normal)
    {
        Vec3 p = s.Place;
        if (s.Kind == Hit.Kinds.Sheet) return massif.Planed ? new(0, false, false, CrackDistance(s, p, normal)) : new(0, false, false, double.PositiveInfinity);
        double radius = Math.Min(LargestRadiusM, edgeRadiusM * Math.Exp(0.5 * chips.At(p)));
        if (s.Kind == Hit.Kinds.Loose)
        {
            double worn = Rounded(massif.Loose[s.Surface / 8].EdgeDistance(p, s.Surface % 8), radius);
            return new(worn, worn < OffPlaneM, false, double.PositiveInfinity);
        }

        (double edge, double crack) = Distances(s, p, normal, radius);
        double inward = Rounded(edge, radius) + (crack < CrackM ? CrackDepthM * (1 - (crack / CrackM)) : 0);
        JointTree tree = massif.Trees[s.Rock];
        ulong lot = tree.BlockOf(tree.Find(p - (normal * 0.002))).Lot;
        bool weathered = s.Kind == Hit.Kinds.Plane && normal.Z > 0.6 && (lot & 0xFFFF) < plan.WeatheredShare * 65536;
        if (weathered) inward += 0.03 + (0.018 * bumps.At(p)) + (0.007 * pits.At(p));
        double roughness = s.Rock == 0 ? plan.HostLook.RoughnessM : plan.Dikes[s.Rock - 1].Look.RoughnessM;
        return new(inward + (roughness * grain.At(p)), !weathered && inward < OffPlaneM, weathered, crack);
    }

    private static double Rounded(double edgeM, double radiusM)
    {
        double x = radiusM - edgeM;
        return x <= 0 ? 0 : radiusM - Math.Sqrt(Math.Max(0, (radiusM * radiusM) - (x * x)));
    }

    /// <summary>Distance to the nearest outer edge of the block, as far as wear reaches, and to the nearest open joint;
    /// infinite without one.</summary>
    private (double EdgeM, double CrackM) Distances(Sight s, Vec3 p, Vec3 normal, double radius)
    {
        JointTree tree = massif.Trees[s.Rock];
        Vec3 inside = p - (normal * 0.004);
        Span<int> path = stackalloc int[64];
        int count = tree.Path(inside, path);
        double edge = double.PositiveInfinity, crack = double.PositiveInfinity;
        for (int k = 0; k < count; k++)
        {
            if (s.Kind == Hit.Kinds.Plane && path[k] == s.Surface) continue;
            (Vec3 n, double offset) = tree.Plane(path[k]);
            double gap = offset - n.Dot(p), cosine = n.Dot(normal), sine = Math.Sqrt(Math.Max(0.01, 1 - (cosine * cosine)));
            double distance = Math.Abs(gap) / sine;
            if (IsOpen(path[k])) crack = Math.Min(crack, distance);
            if (distance > radius || distance > edge) continue;
            // Just across the joint and just under the surface: no rock there means that this is an outer edge.
            Vec3 outward = (n - (normal * cosine)) * (Math.Sign(gap) / sine);
            if (!massif.Solid(inside + (outward * (distance + 0.012)))) edge = distance;
        }

        return (edge, edge <= radius ? double.PositiveInfinity : crack);
    }

    private double CrackDistance(Sight s, Vec3 p, Vec3 normal) =>
        Distances(s, p - (normal * 0.01), normal, 0).CrackM;

    /// <summary>Some joints are healed or tight and show no trace.</summary>
    private static bool IsOpen(int node) => (Dice.Scramble((ulong)node + 77) & 7) < 5;
}
