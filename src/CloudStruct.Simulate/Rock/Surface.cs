using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Chance;
using CloudStruct.Simulate.Views;

namespace CloudStruct.Simulate.Rock;

/// <summary>Turns what a camera sees into the real rock surface: worn edges, weathered tops, the grain of the rock.</summary>
internal sealed class Surface
{
    /// <summary>Beyond this the surface has left its plane: about the noise of one point.</summary>
    private const double OffPlaneM = 0.005;

    private readonly Massif massif;
    private readonly OutcropPlan plan;
    private readonly double edgeRadiusM;
    private readonly LatticeField bumps, pits, grain;

    /// <summary>Draws the wear of an outcrop.</summary>
    public Surface(Massif massif, OutcropPlan plan, ulong seed)
    {
        this.massif = massif;
        this.plan = plan;
        edgeRadiusM = new Dice(seed, Purpose.Plan, 200).In(plan.EdgeRadiusM);
        bumps = new LatticeField(seed, 40, 0.16);
        pits = new LatticeField(seed, 41, 0.05);
        grain = new LatticeField(seed, 42, 0.03);
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
                return massif.Sheet.Normal(s.Place);
        }
    }

    /// <summary>How far the surface lies inward of the plane that was seen [m], and whether the point still belongs to it.</summary>
    public (double InwardM, bool OnPlane, bool Weathered) Wear(Sight s, Vec3 normal)
    {
        if (s.Kind == Hit.Kinds.Sheet) return (0, false, false);
        Vec3 p = s.Place;
        if (s.Kind == Hit.Kinds.Loose)
        {
            double worn = Rounded(massif.Loose[s.Surface / 8].EdgeDistance(p, s.Surface % 8));
            return (worn, worn < OffPlaneM, false);
        }

        double inward = Rounded(EdgeDistance(s, p, normal));
        JointTree tree = massif.Trees[s.Rock];
        ulong lot = tree.BlockOf(tree.Find(p - (normal * 0.002))).Lot;
        bool weathered = s.Kind == Hit.Kinds.Plane && normal.Z > 0.6 && (lot & 0xFFFF) < plan.WeatheredShare * 65536;
        if (weathered) inward += 0.03 + (0.018 * bumps.At(p)) + (0.007 * pits.At(p));
        double roughness = s.Rock == 0 ? plan.HostLook.RoughnessM : plan.Dikes[s.Rock - 1].Look.RoughnessM;
        return (inward + (roughness * grain.At(p)), !weathered && inward < OffPlaneM, weathered);
    }

    private double Rounded(double edgeM)
    {
        double x = edgeRadiusM - edgeM;
        return x <= 0 ? 0 : edgeRadiusM - Math.Sqrt(Math.Max(0, (edgeRadiusM * edgeRadiusM) - (x * x)));
    }

    /// <summary>Distance to the nearest outer edge of the block, as far as wear reaches; infinite without one.</summary>
    private double EdgeDistance(Sight s, Vec3 p, Vec3 normal)
    {
        JointTree tree = massif.Trees[s.Rock];
        Vec3 inside = p - (normal * 0.004);
        Span<int> path = stackalloc int[64];
        int count = tree.Path(inside, path);
        double nearest = double.PositiveInfinity;
        for (int k = 0; k < count; k++)
        {
            if (s.Kind == Hit.Kinds.Plane && path[k] == s.Surface) continue;
            (Vec3 n, double offset) = tree.Plane(path[k]);
            double gap = offset - n.Dot(p), cosine = n.Dot(normal), sine = Math.Sqrt(Math.Max(0.01, 1 - (cosine * cosine)));
            double distance = Math.Abs(gap) / sine;
            if (distance > edgeRadiusM || distance > nearest) continue;
            // Just across the joint and just under the surface: no rock there means that this is an outer edge.
            Vec3 outward = (n - (normal * cosine)) * (Math.Sign(gap) / sine);
            if (!massif.Solid(inside + (outward * (distance + 0.012)))) nearest = distance;
        }

        return nearest;
    }
}
