using CloudStruct.Records.Frame;

namespace CloudStruct.Simulate.Rock;

/// <summary>The whole outcrop as a solid: host blocks, dike blocks, what lies on them.</summary>
internal sealed class Massif
{
    private const double BottomM = -6;
    private readonly SiteBox looseBox;
    private readonly double looseTopM;

    /// <summary>An outcrop from its parts.</summary>
    public Massif(Terrain terrain, JointTree host, DikeSheet[] dikes, JointTree[] dikeBlocks, GroundSheet[] sheets, LooseBlock[] loose, bool planed)
    {
        Terrain = terrain;
        Dikes = dikes;
        Sheets = sheets;
        Loose = loose;
        Planed = planed;
        Trees = [host, .. dikeBlocks];
        (looseBox, looseTopM) = BoxOf(terrain, loose);
    }

    /// <summary>The ground that decided which blocks are there.</summary>
    public Terrain Terrain { get; }

    /// <summary>The dikes.</summary>
    public DikeSheet[] Dikes { get; }

    /// <summary>Blocks of the host, then of each dike.</summary>
    public JointTree[] Trees { get; }

    /// <summary>What lies on the rock.</summary>
    public GroundSheet[] Sheets { get; }

    /// <summary>Fallen blocks.</summary>
    public LooseBlock[] Loose { get; }

    /// <summary>Whether the sheet is the rock's own planed surface.</summary>
    public bool Planed { get; }

    /// <summary>Number of the dike at a place, 0 in the host. Where dikes cross, the later one cuts the earlier.</summary>
    public int RockAt(Vec3 p)
    {
        for (int d = Dikes.Length - 1; d >= 0; d--)
        {
            if (Dikes[d].Contains(p)) return d + 1;
        }

        return 0;
    }

    /// <summary>Whether rock in place is there.</summary>
    public bool Solid(Vec3 p) => Trees[RockAt(p)].Solid(p);

    /// <summary>The first surface that a ray meets inside the site.</summary>
    /// <param name="from">Start, local.</param>
    /// <param name="toward">Unit direction.</param>
    /// <param name="farthest">End of the ray [m].</param>
    /// <param name="crossings">Scratch memory of the worker.</param>
    /// <param name="hit">[out] What is met.</param>
    public bool Cast(Vec3 from, Vec3 toward, double farthest, CrossingList crossings, out Hit hit)
    {
        hit = default;
        if (!Clip(from, toward, farthest, out double start, out double end)) return false;
        bool met = false;
        double t = end;
        for (int k = 0; k < Sheets.Length; k++)
        {
            if (!Sheets[k].Cast(from, toward, start, t, out double ts)) continue;
            Vec3 p = from + (toward * ts);
            met = true;
            t = ts;
            hit = new Hit { T = ts, Kind = Hit.Kinds.Sheet, Surface = k, Normal = Sheets[k].Normal(p), Rock = Planed ? RockAt(p) : 0 };
        }

        if (Loose.Length > 0 && CastLoose(from, toward, start, t, out Hit block))
        {
            met = true;
            t = block.T;
            hit = block;
        }

        if (!Planed && CastRock(from, toward, start, t, crossings, out Hit rock))
        {
            met = true;
            hit = rock;
        }

        return met && hit.T > start + 1e-6;
    }

    private bool CastLoose(Vec3 from, Vec3 toward, double start, double end, out Hit hit)
    {
        hit = default;
        (double a, double b) = Terrain.Site(from);
        if (!SiteBox.Clip(a, toward.Dot(Terrain.Uphill), looseBox.FromA, looseBox.ToA, ref start, ref end)
            || !SiteBox.Clip(b, toward.Dot(Terrain.Right), looseBox.FromB, looseBox.ToB, ref start, ref end)
            || !SiteBox.Clip(from.Z, toward.Z, BottomM, looseTopM, ref start, ref end))
        {
            return false;
        }

        bool met = false;
        for (int k = 0; k < Loose.Length; k++)
        {
            if (!Loose[k].Cast(from, toward, start, end, out double t, out int side)) continue;
            met = true;
            end = t;
            hit = new Hit { T = t, Kind = Hit.Kinds.Loose, Surface = (8 * k) + side, Normal = Loose[k].Sides[side].Normal };
        }

        return met;
    }

    private bool CastRock(Vec3 from, Vec3 toward, double start, double end, CrossingList crossings, out Hit hit)
    {
        // Before the ray comes near any dike it can only meet host blocks, and mostly it does.
        double near = end;
        foreach (DikeSheet dike in Dikes) near = Math.Min(near, dike.ComesNear(from, toward, start, end));
        if (near > start && Trees[0].Cast(from, toward, start, near, out double first, out int plane))
        {
            hit = plane >= 0 ? OnPlane(first, 0, plane, toward) : OnMargin(first, 0, -1, from, toward);
            return true;
        }

        if (near < end) return CastAmongDikes(from, toward, near, end, start, crossings, out hit);
        hit = default;
        return false;
    }

    private bool CastAmongDikes(Vec3 from, Vec3 toward, double start, double end, double rayStart, CrossingList crossings, out Hit hit)
    {
        crossings.Clear();
        foreach (DikeSheet dike in Dikes) dike.AddCrossings(from, toward, start, end, crossings);
        double a = start;
        int margin = -1;
        for (int k = 0; k <= crossings.Count; k++)
        {
            double b = k < crossings.Count ? crossings[k].T : end;
            if (b - a > 1e-9)
            {
                int rock = RockAt(from + (toward * ((a + b) / 2)));
                if (Trees[rock].Cast(from, toward, a, b, out double t, out int node))
                {
                    hit = node >= 0 ? OnPlane(t, rock, node, toward) : OnMargin(margin < 0 ? rayStart : t, rock, margin, from, toward);
                    return true;
                }
            }

            a = b;
            if (k < crossings.Count) margin = (2 * (crossings[k].Dike - 1)) + crossings[k].Side;
        }

        hit = default;
        return false;
    }

    private Hit OnPlane(double t, int rock, int node, Vec3 toward)
    {
        Vec3 n = Trees[rock].Plane(node).Normal;
        return new Hit { T = t, Kind = Hit.Kinds.Plane, Rock = rock, Surface = node, Normal = n.Dot(toward) > 0 ? -n : n };
    }

    private Hit OnMargin(double t, int rock, int margin, Vec3 from, Vec3 toward)
    {
        // Without a margin the ray began inside a block, at a wall of the site; the caller drops it by its distance.
        if (margin < 0) return new Hit { T = t, Kind = Hit.Kinds.Margin, Rock = rock, Normal = toward * -1 };
        DikeSheet dike = Dikes[margin / 2];
        (double s, double v, _) = dike.Inside(from + (toward * t));
        Vec3 n = dike.MarginNormal(margin % 2, s, v);
        return new Hit { T = t, Kind = Hit.Kinds.Margin, Rock = rock, Surface = margin, Normal = n.Dot(toward) > 0 ? -n : n };
    }

    private bool Clip(Vec3 from, Vec3 toward, double farthest, out double start, out double end)
    {
        (double a, double b) = Terrain.Site(from);
        (start, end) = (0, farthest);
        return SiteBox.Clip(a, toward.Dot(Terrain.Uphill), 0, Terrain.LengthM, ref start, ref end)
            && SiteBox.Clip(b, toward.Dot(Terrain.Right), 0, Terrain.BreadthM, ref start, ref end)
            && SiteBox.Clip(from.Z, toward.Z, BottomM, Terrain.TopM, ref start, ref end);
    }

    private static (SiteBox Box, double TopM) BoxOf(Terrain terrain, LooseBlock[] loose)
    {
        if (loose.Length == 0) return default;
        (double A, double B)[] at = [.. loose.Select(l => terrain.Site(l.Middle))];
        double reach = loose.Max(l => l.ReachM);
        return (
            new(at.Min(p => p.A) - reach, at.Max(p => p.A) + reach, at.Min(p => p.B) - reach, at.Max(p => p.B) + reach),
            loose.Max(l => l.Middle.Z) + reach);
    }
}
