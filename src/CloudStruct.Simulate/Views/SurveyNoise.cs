using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Chance;

namespace CloudStruct.Simulate.Views;

/// <summary>What photogrammetry does to the surface: noise that neighbours share, noise of each point, stray points.</summary>
internal sealed class SurveyNoise
{
    private readonly ulong seed;
    private readonly double strayShare;
    private readonly LatticeField shared;

    /// <summary>Draws the quality of a survey.</summary>
    public SurveyNoise(OutcropPlan plan, ulong seed)
    {
        this.seed = seed;
        var dice = new Dice(seed, Purpose.Plan, 400);
        SharedM = dice.In(plan.NoiseM);
        LengthM = dice.In(plan.NoiseLengthM);
        WhiteM = dice.In(plan.WhiteNoiseM);
        strayShare = dice.In(plan.StrayShare);
        shared = new LatticeField(seed, 1, LengthM);
    }

    /// <summary>Standard deviation of the shared noise along the normal [m].</summary>
    public double SharedM { get; }

    /// <summary>Distance at which its correlation has fallen to 1/e [m].</summary>
    public double LengthM { get; }

    /// <summary>Standard deviation of the white noise in each direction [m].</summary>
    public double WhiteM { get; }

    /// <summary>Where point i of the cloud ends up.</summary>
    /// <param name="i">Its index.</param>
    /// <param name="p">Place on the surface.</param>
    /// <param name="n">Outward normal.</param>
    /// <param name="view">Unit direction from the camera.</param>
    /// <param name="stray">[out] Whether it is a stray point off any surface.</param>
    public Vec3 Apply(int i, Vec3 p, Vec3 n, Vec3 view, out bool stray)
    {
        var lot = new Dice(seed, Purpose.White, (ulong)i);
        stray = lot.Chance(strayShare);
        if (stray)
        {
            // Mismatches lie along the ray, before the surface more often than behind it, most of them near.
            double off = 0.04 + (0.25 * -Math.Log(1 - lot.Unit()));
            return p + (view * (lot.Chance(0.7) ? -off : off)) + new Vec3(0.02 * lot.Normal(), 0.02 * lot.Normal(), 0.02 * lot.Normal());
        }

        return p + (n * (SharedM * shared.At(p))) + (new Vec3(lot.Normal(), lot.Normal(), lot.Normal()) * WhiteM);
    }
}
