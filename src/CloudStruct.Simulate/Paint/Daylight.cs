using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Chance;
using CloudStruct.Simulate.Rock;

namespace CloudStruct.Simulate.Paint;

/// <summary>Sun and sky: how much light of which colour falls on a place.</summary>
internal sealed class Daylight
{
    private static readonly (double R, double G, double B) SunColour = (1.0, 0.955, 0.87), SkyColour = (0.78, 0.90, 1.12);
    private readonly Massif massif;
    private readonly Vec3 towardSun;

    /// <summary>Draws the hour of an outcrop.</summary>
    public Daylight(Massif massif, OutcropPlan plan, ulong seed)
    {
        this.massif = massif;
        var dice = new Dice(seed, Purpose.Plan, 300);
        double height = dice.In(plan.SunHeightDeg) * Math.PI / 180;
        // From the front quarter: a cliff in full shade tells nobody anything, so nobody flies then.
        double azimuth = massif.Terrain.UphillDeg + 180 + dice.Between(-80, 80);
        towardSun = (Axes.Toward(azimuth) * Math.Cos(height)) + new Vec3(0, 0, Math.Sin(height));
    }

    /// <summary>Light on a surface: red, green, blue, 1 for white paper square to the sun.</summary>
    /// <param name="p">Place.</param>
    /// <param name="n">Outward normal.</param>
    /// <param name="crossings">Scratch memory of the worker.</param>
    /// <param name="lot">Random numbers of the point.</param>
    public (double R, double G, double B) On(Vec3 p, Vec3 n, CrossingList crossings, ref Dice lot)
    {
        Vec3 outside = p + (n * 0.012);
        double cosine = Math.Max(0, n.Dot(towardSun)), sun = 0;
        if (cosine > 0)
        {
            // The sun is half a degree wide and the model blurs: shadow rims are soft.
            Vec3 ray = (towardSun + new Vec3(0.012 * lot.Normal(), 0.012 * lot.Normal(), 0.012 * lot.Normal())).Unit();
            sun = massif.Cast(outside, ray, 30, crossings, out _) ? 0 : 0.86 * cosine;
        }

        double open = Openness(outside, n, crossings, ref lot), sky = 0.30 * open * (0.62 + (0.38 * n.Z)), bounce = 0.05 * (1 - n.Z);
        return (
            (sun * SunColour.R) + (sky * SkyColour.R) + bounce,
            (sun * SunColour.G) + (sky * SkyColour.G) + (0.93 * bounce),
            (sun * SunColour.B) + (sky * SkyColour.B) + (0.82 * bounce));
    }

    /// <summary>Share of the sky near a place, from two short rays: crevices are dark.</summary>
    private double Openness(Vec3 p, Vec3 n, CrossingList crossings, ref Dice lot)
    {
        int free = 0;
        for (int k = 0; k < 2; k++)
        {
            Vec3 ray = lot.Fisher(n, 1.5);
            double along = ray.Dot(n);
            if (along < 0.05) ray = (ray + (n * (0.1 - along))).Unit();
            if (!massif.Cast(p, ray, 1.2, crossings, out _)) free++;
        }

        return 0.45 + (0.275 * free);
    }
}
