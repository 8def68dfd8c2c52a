using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Chance;

namespace CloudStruct.Simulate.Rock;

/// <summary>The ground that decides which blocks are still there: benches, steps and cliffs up a slope.</summary>
/// <remarks>Site coordinates: a uphill from the foot, b to the right of uphill; the local origin is the site's middle.</remarks>
internal sealed class Terrain
{
    private const double GridM = 0.1, RimM = 2;
    private readonly (double AtM, double HeightM, double RunM, LatticeField Wander)[] steps;
    private readonly LatticeField hills, knobs;
    private readonly double benchSlope, wanderM, gullyDepthM, gullyWidthM, gullySlant;
    private readonly bool planed;
    private readonly float[] heights;
    private readonly int columns;

    /// <summary>Draws the ground of a plan.</summary>
    public Terrain(OutcropPlan plan, ulong seed)
    {
        var dice = new Dice(seed, Purpose.Terrain);
        UphillDeg = dice.In(plan.UphillDeg);
        Uphill = Axes.Toward(UphillDeg);
        Right = Axes.Toward(UphillDeg + 90);
        (LengthM, BreadthM) = (plan.LengthM, plan.BreadthM);
        benchSlope = Math.Tan(dice.In(plan.BenchSlopeDeg) * Math.PI / 180);
        wanderM = plan.StepWanderM;
        planed = plan.Planed;
        steps = new (double, double, double, LatticeField)[plan.Steps.Length];
        for (int i = 0; i < steps.Length; i++)
        {
            StepPlan s = plan.Steps[i];
            steps[i] = (dice.In(s.At) * LengthM, dice.In(s.HeightM), dice.In(s.RunM), new LatticeField(seed, 100 + (ulong)i, 4));
        }

        gullyDepthM = dice.In(plan.GullyDepthM);
        gullyWidthM = dice.In(plan.GullyWidthM);
        gullySlant = Math.Tan(dice.Between(-15, 15) * Math.PI / 180);
        hills = new LatticeField(seed, 90, 5);
        knobs = new LatticeField(seed, 91, 1.6);
        columns = (int)((BreadthM + (2 * RimM)) / GridM) + 2;
        heights = new float[((int)((LengthM + (2 * RimM)) / GridM) + 2) * columns];
        for (int k = 0; k < heights.Length; k++) heights[k] = (float)Compute((k / columns * GridM) - RimM, (k % columns * GridM) - RimM);
        TopM = heights.Max() + 2;
    }

    /// <summary>Grid azimuth of uphill [deg].</summary>
    public double UphillDeg { get; }

    /// <summary>Level unit vector uphill.</summary>
    public Vec3 Uphill { get; }

    /// <summary>Level unit vector to the right of uphill.</summary>
    public Vec3 Right { get; }

    /// <summary>Extent uphill [m].</summary>
    public double LengthM { get; }

    /// <summary>Extent across [m].</summary>
    public double BreadthM { get; }

    /// <summary>Nothing rises above this height [m].</summary>
    public double TopM { get; }

    /// <summary>Foot and head of the highest step along the middle, uphill from the foot of the site [m].</summary>
    public (double AtM, double HeightM) HighestStep => steps.Length == 0 ? (0, 0) : steps.Select(s => (s.AtM, s.HeightM)).MaxBy(s => s.HeightM);

    /// <summary>Site coordinates of a local place.</summary>
    public (double A, double B) Site(Vec3 p) => (p.Dot(Uphill) + (LengthM / 2), p.Dot(Right) + (BreadthM / 2));

    /// <summary>Local place of site coordinates.</summary>
    public Vec3 Place(double a, double b, double z) => (Uphill * (a - (LengthM / 2))) + (Right * (b - (BreadthM / 2))) + new Vec3(0, 0, z);

    /// <summary>How far a place lies across the gully's middle line [m].</summary>
    public double AcrossGully(double a, double b) => b - (BreadthM / 2) - (gullySlant * (a - (LengthM / 2)));

    /// <summary>Height of the ground [m]; the nearest known one beyond the rim.</summary>
    public double Height(double a, double b)
    {
        double x = Math.Clamp((a + RimM) / GridM, 0, (heights.Length / columns) - 1.001), y = Math.Clamp((b + RimM) / GridM, 0, columns - 1.001);
        int i = (int)x, j = (int)y, k = (i * columns) + j;
        double u = x - i, v = y - j;
        return ((1 - u) * (((1 - v) * heights[k]) + (v * heights[k + 1])))
            + (u * (((1 - v) * heights[k + columns]) + (v * heights[k + columns + 1])));
    }

    /// <summary>Lowest and highest ground within a reach uphill and downhill: the heights between which a cliff shows rock.</summary>
    public (double Low, double High) HeightsWithin(double a, double b, double reachM)
    {
        double h = Height(a, b), down = Height(a - reachM, b), up = Height(a + reachM, b);
        return (Math.Min(h, Math.Min(down, up)), Math.Max(h, Math.Max(down, up)));
    }

    private double Compute(double a, double b)
    {
        var flat = new Vec3(a, b, 0);
        double z = benchSlope * a;
        foreach ((double at, double height, double run, LatticeField wander) in steps)
        {
            double f = Math.Clamp(((a - at - (wanderM * wander.At(new Vec3(b, 3 * at, 0)))) / run) + 0.5, 0, 1);
            z += height * f * f * (3 - (2 * f));
        }

        z += planed ? (0.12 * hills.At(flat)) + (0.02 * knobs.At(flat)) : (0.22 * hills.At(flat)) + (0.18 * knobs.At(flat));
        if (gullyDepthM > 0)
        {
            double q = AcrossGully(a, b) / (gullyWidthM / 2);
            z -= gullyDepthM * Math.Exp(-q * q * q * q);
        }

        return z;
    }
}
