using CloudStruct.Records.Classes;
using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Chance;

namespace CloudStruct.Simulate.Rock;

/// <summary>Where soil, turf and scree lie, and how thick.</summary>
internal sealed class Drape
{
    private readonly Terrain terrain;
    private readonly (double A, double B, double HalfA, double HalfB)[] patches;
    private readonly LatticeField rim, tufts, lumps, gravel;
    private readonly double screeFromM, screeToM;

    /// <summary>Draws the drape of a plan.</summary>
    public Drape(OutcropPlan plan, Terrain terrain, ulong seed)
    {
        this.terrain = terrain;
        patches = new (double, double, double, double)[plan.Cover.Length];
        for (int i = 0; i < patches.Length; i++)
        {
            CoverPlan c = plan.Cover[i];
            var dice = new Dice(seed, Purpose.Cover, (ulong)i);
            patches[i] = (dice.In(c.At) * terrain.LengthM, dice.In(c.Across) * terrain.BreadthM, dice.In(c.LengthM) / 2, dice.In(c.BreadthM) / 2);
        }

        rim = new LatticeField(seed, 80, 1.0);
        tufts = new LatticeField(seed, 81, 0.05);
        lumps = new LatticeField(seed, 82, 0.35);
        gravel = new LatticeField(seed, 83, 0.06);
        (screeToM, screeFromM) = plan.LooseBlocks > 0 ? (terrain.HighestStep.AtM - 0.3, terrain.HighestStep.AtM - 4.2) : (-10, -10);
    }

    /// <summary>How deep the soil is here, 0 to 1.</summary>
    public double Soil(double a, double b)
    {
        double most = 0;
        foreach ((double a0, double b0, double halfA, double halfB) in patches)
        {
            double da = (a - a0) / halfA, db = (b - b0) / halfB;
            double r = Math.Sqrt(Math.Sqrt((da * da * da * da) + (db * db * db * db)));
            if (r < 1.6) most = Math.Max(most, Ramp((1 + (0.22 * rim.At(new(a, b, 0))) - r) / 0.35));
        }

        return most;
    }

    /// <summary>How deep the scree is here, 0 to 1.</summary>
    public double Scree(double a, double b)
    {
        if (a < screeFromM - 1.5 || a > screeToM + 1.5) return 0;
        double wander = 0.9 * rim.At(new(0.6 * a, b, 7));
        return Ramp((a - screeFromM + wander) / 1.2) * Ramp((screeToM - a + (0.5 * wander)) / 0.8) * Ramp((rim.At(new(0.5 * a, 0.5 * b, 31)) + 1.1) / 0.8);
    }

    /// <summary>How far the rock under the drape is lowered [m].</summary>
    public double Lowering(double a, double b) => (0.75 * Soil(a, b)) + (0.45 * Scree(a, b));

    /// <summary>Sheets of soil and scree.</summary>
    public IEnumerable<GroundSheet> Sheets(double cellM, int threads)
    {
        foreach ((double a, double b, double halfA, double halfB) in patches)
        {
            var box = new SiteBox(a - (1.6 * halfA), a + (1.6 * halfA), b - (1.6 * halfB), b + (1.6 * halfB));
            yield return new GroundSheet(terrain, RockClass.Cover, box, cellM, threads, Turf);
        }

        if (screeToM > screeFromM)
        {
            var box = new SiteBox(screeFromM - 1.5, screeToM + 1.5, 0, terrain.BreadthM);
            yield return new GroundSheet(terrain, RockClass.Loose, box, cellM, threads, Stones);
        }
    }

    private double Turf(double a, double b)
    {
        double soil = Soil(a, b);
        var flat = new Vec3(a, b, 0);
        return soil < 0.02 ? double.NaN : terrain.Height(a, b) - 1 + (1.12 * soil) + (0.04 * lumps.At(flat)) + (0.02 * tufts.At(flat));
    }

    private double Stones(double a, double b)
    {
        double scree = Scree(a, b);
        var flat = new Vec3(a, b, 0);
        return scree < 0.02 ? double.NaN : terrain.Height(a, b) - 1 + (0.95 * scree) + (0.07 * lumps.At(flat)) + (0.022 * gravel.At(flat));
    }

    /// <summary>From 0 to 1, smoothly.</summary>
    internal static double Ramp(double x)
    {
        double f = Math.Clamp(x, 0, 1);
        return f * f * (3 - (2 * f));
    }
}
