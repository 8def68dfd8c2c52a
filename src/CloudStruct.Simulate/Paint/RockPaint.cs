using CloudStruct.Records.Classes;
using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Chance;
using CloudStruct.Simulate.Rock;

namespace CloudStruct.Simulate.Paint;

/// <summary>Colour of the ground before light: rocks with grain, mottles and bands, lichen, stains, turf, scree.</summary>
internal sealed class RockPaint
{
    private readonly Massif massif;
    private readonly OutcropPlan plan;
    private readonly LatticeField grain, mottle, wide, hue, band, lichen, spots, streak;
    private readonly double lichenLimit;
    private readonly Vec3 bandPole;
    private readonly (double B, double WidthM, double Slant)[] stains;

    /// <summary>Draws the colours of an outcrop.</summary>
    public RockPaint(Massif massif, OutcropPlan plan, ulong seed)
    {
        this.massif = massif;
        this.plan = plan;
        var dice = new Dice(seed, Purpose.Colour);
        grain = new LatticeField(seed, 20, 0.012);
        mottle = new LatticeField(seed, 21, 0.12);
        wide = new LatticeField(seed, 22, 0.9);
        hue = new LatticeField(seed, 23, 0.4);
        band = new LatticeField(seed, 24, plan.HostLook.BandM);
        lichen = new LatticeField(seed, 25, 0.22);
        spots = new LatticeField(seed, 26, 0.05);
        streak = new LatticeField(seed, 27, 0.3);
        lichenLimit = UpperQuantile(dice.In(plan.LichenShare));
        bandPole = dice.Fisher(Axes.Pole(massif.Terrain.UphillDeg + dice.Between(0, 360), dice.Between(20, 60)), 100);
        stains = new (double, double, double)[plan.Stains];
        for (int i = 0; i < stains.Length; i++)
        {
            stains[i] = (dice.Between(0.15, 0.85) * massif.Terrain.BreadthM, dice.Between(0.4, 1.6), Math.Tan(dice.Between(-20, 20) * Math.PI / 180));
        }
    }

    /// <summary>Linear reflectance at a place.</summary>
    /// <param name="p">Place before noise.</param>
    /// <param name="n">Outward normal.</param>
    /// <param name="kind">True class.</param>
    /// <param name="rock">0 host, else number of the dike.</param>
    /// <param name="blockLot">Random number of the block.</param>
    /// <param name="wear">Wear of the surface there.</param>
    public (double R, double G, double B) At(Vec3 p, Vec3 n, RockClass kind, int rock, ulong blockLot, Wear wear)
    {
        if (kind == RockClass.Cover) return Turf(p);
        RockLook look = rock == 0 || kind == RockClass.Inclusion ? plan.HostLook : plan.Dikes[rock - 1].Look;
        double tone = (look.Grain * grain.At(p)) + (look.Mottle * ((0.7 * mottle.At(p)) + (0.5 * wide.At(p))))
            + (0.07 * ((((blockLot >> 16) & 0xFFFF) / 32768.0) - 1));
        if (look.Banding > 0)
        {
            Vec3 squeezed = (p * 0.12) + (bandPole * (0.88 * p.Dot(bandPole)));   // long along the bands, short across
            tone += look.Banding * band.At(squeezed);
        }

        // Dirt and shade in open joints; a camera smears the line over a centimetre or two.
        tone -= 0.75 * Drape.Ramp(1 - (wear.CrackM / 0.02));
        if (wear.Weathered) tone += 0.06;
        double warm = (0.04 * hue.At(p)) + (wear.Weathered ? 0.02 : 0), k = Math.Exp(tone);
        (double r, double g, double b) = (look.Red * k * (1 + warm), look.Green * k, look.Blue * k * (1 - warm));
        k = Stained(p, n);
        (r, g, b) = (r * k, g * k, b * (0.4 * k + 0.6 * k * k));
        return kind == RockClass.Loose ? (r * 1.05, g * 1.03, b) : Lichened(p, n, (r, g, b));
    }

    private (double R, double G, double B) Turf(Vec3 p)
    {
        // Turf where the field is high, bare soil where it is low, dry blades in between.
        double green = Drape.Ramp((wide.At(p) + (0.7 * mottle.At(p)) + 0.9) / 0.8), k = Math.Exp((0.28 * grain.At(p)) + (0.22 * spots.At(p)));
        double dry = Drape.Ramp((hue.At(p * 2) - 0.2) / 0.8) * 0.5;
        (double r, double g, double b) = (0.145 - (0.07 * green) + (0.07 * dry), 0.105 + (0.015 * green) + (0.05 * dry), 0.070 - (0.032 * green) + (0.02 * dry));
        return (r * k, g * k, b * k);
    }

    private (double R, double G, double B) Lichened(Vec3 p, Vec3 n, (double R, double G, double B) rock)
    {
        double up = 0.35 * (Math.Max(n.Z, 0) - 0.4), value = lichen.At(p) + up;
        if (value < lichenLimit - 0.15) return rock;
        double share = Drape.Ramp((value + (0.35 * spots.At(p)) - lichenLimit) / 0.3) * 0.9, tone = Math.Exp(0.2 * grain.At(p));
        // Pale grey crusts mostly, some black, few yellow.
        double sort = hue.At(p * 0.8 + new Vec3(17, 0, 0));
        (double R, double G, double B) crust = sort > 1.25 ? (0.42, 0.33, 0.10) : sort < -0.8 ? (0.075, 0.075, 0.07) : (0.40, 0.41, 0.37);
        return (
            rock.R + (share * ((crust.R * tone) - rock.R)),
            rock.G + (share * ((crust.G * tone) - rock.G)),
            rock.B + (share * ((crust.B * tone) - rock.B)));
    }

    /// <summary>Darkening by seeping water on steep faces and by the stripes of the plan.</summary>
    private double Stained(Vec3 p, Vec3 n)
    {
        double dark = 0;
        if (n.Z < 0.5) dark = 0.32 * Drape.Ramp((streak.At(new(p.X, p.Y, 0.15 * p.Z)) - 0.9) / 0.7) * (0.5 - Math.Max(n.Z, 0)) * 2;
        if (stains.Length > 0)
        {
            (double a, double b) = massif.Terrain.Site(p);
            foreach ((double at, double width, double slant) in stains)
            {
                double q = Math.Abs(b - at - (slant * (a - (massif.Terrain.LengthM / 2)))) / (width / 2);
                dark = Math.Max(dark, 0.42 * Drape.Ramp((1.25 - q + (0.35 * wide.At(p)) + (0.15 * mottle.At(p))) / 0.5));
            }
        }

        return 1 - dark;
    }

    /// <summary>Value of a standard normal number that is exceeded with a small probability.</summary>
    private static double UpperQuantile(double share)
    {
        if (share <= 0) return 100;
        double lo = -6, hi = 6;
        for (int k = 0; k < 60; k++)
        {
            double mid = (lo + hi) / 2;
            if (UpperTail(mid) > share) lo = mid;
            else hi = mid;
        }

        return lo;
    }

    /// <summary>Upper tail of the standard normal law, by summing its density outward.</summary>
    private static double UpperTail(double x)
    {
        double sum = 0;
        for (double t = x; t < x + 9; t += 0.01) sum += 0.01 * Math.Exp(-(t + 0.005) * (t + 0.005) / 2);
        return sum / Math.Sqrt(2 * Math.PI);
    }
}
