using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Chance;

namespace CloudStruct.Simulate.Rock;

/// <summary>The body of one dike: two undulating, sub-parallel margins about a middle plane that may bend.</summary>
/// <remarks>Coordinates along strike s, up the dip v and across w, all from a point of the middle plane. A margin is the
/// surface w = rest(s, v), so that w - rest has the sign of the side and, divided by its gradient, the distance.</remarks>
internal sealed class DikeSheet
{
    private const int Waves = 3;
    private readonly double bendPerM, widthM, taperPerM, jump, jumpAtM, tipAtM = double.PositiveInfinity, tipLengthM = 1, tipSide = 1;
    private readonly Wave[] shared, ownA, ownB;
    private readonly (double Min, double Max) boundsA, boundsB;

    /// <summary>Draws the dike of a plan.</summary>
    /// <param name="plan">Its plan.</param>
    /// <param name="seed">Seed of the outcrop.</param>
    /// <param name="number">1, 2, ...</param>
    /// <param name="middle">A point of the middle plane, local.</param>
    /// <param name="uphillDeg">Grid azimuth of uphill.</param>
    /// <param name="reachM">Extent along strike over which the plan's bend and taper are meant.</param>
    public DikeSheet(DikePlan plan, ulong seed, int number, Vec3 middle, double uphillDeg, double reachM)
    {
        Plan = plan;
        Number = number;
        Middle = middle;
        var dice = new Dice(seed, Purpose.Dike, (ulong)number);
        double trend = Wrap180(uphillDeg + dice.In(plan.StrikeDeg));
        double dip = dice.In(plan.DipDeg);
        Along = Axes.Toward(trend);
        // B is on the right of increasing chainage. The sheet leans to B or to A by chance: its normal from A to B then
        // points down or up.
        double lean = (90 - dip) * (dice.Chance(0.5) ? 1 : -1) * Math.PI / 180;
        Across = (Axes.Toward(trend + 90) * Math.Cos(lean)) - new Vec3(0, 0, Math.Sin(lean));
        Up = Across.Cross(Along);
        if (Up.Z < 0) Up = -Up;
        widthM = dice.In(plan.WidthM);
        bendPerM = dice.In(plan.BendDeg) * Sign(ref dice) * Math.PI / 180 / reachM;
        taperPerM = dice.In(plan.Taper) * Sign(ref dice) / reachM;
        jump = dice.In(plan.Jump) * Sign(ref dice);
        jumpAtM = dice.Between(-0.3, 0.3) * reachM;
        ReliefM = dice.In(plan.ReliefM);
        shared = MakeWaves(ref dice, dice.In(plan.WaveM), 5, 14);
        ownA = MakeWaves(ref dice, dice.In(plan.OwnWaveM), 2.5, 7);
        ownB = MakeWaves(ref dice, dice.In(plan.OwnWaveM), 2.5, 7);
        if (plan.TipAt is { } tip)
        {
            tipAtM = dice.In(tip) * reachM;
            tipLengthM = dice.In(plan.TipLengthM);
            tipSide = Sign(ref dice);
        }

        boundsA = Bounds(reachM, 0);
        boundsB = Bounds(reachM, 1);
        HalfReachM = 0.75 * reachM;
    }

    /// <summary>The plan it was drawn from.</summary>
    public DikePlan Plan { get; }

    /// <summary>1, 2, ...</summary>
    public int Number { get; }

    /// <summary>A point of the middle plane, local: chainage 0.</summary>
    public Vec3 Middle { get; }

    /// <summary>Level unit vector along strike, toward an azimuth in 0 ≤ a &lt; 180.</summary>
    public Vec3 Along { get; }

    /// <summary>Unit normal of the middle plane from A to B.</summary>
    public Vec3 Across { get; }

    /// <summary>Unit vector up the dip.</summary>
    public Vec3 Up { get; }

    /// <summary>How far its surface stands above the host's [m].</summary>
    public double ReliefM { get; }

    /// <summary>Half the extent along strike for which the bounds of the margins hold [m].</summary>
    public double HalfReachM { get; }

    /// <summary>Between these places across, both margins lie everywhere [m].</summary>
    public (double FromM, double ToM) AcrossM => (boundsA.Min, boundsB.Max);

    /// <summary>Along strike, up dip and across, of a local place.</summary>
    public (double S, double V, double W) Inside(Vec3 p)
    {
        Vec3 d = p - Middle;
        return (d.Dot(Along), d.Dot(Up), d.Dot(Across));
    }

    /// <summary>Local place of dike coordinates.</summary>
    public Vec3 Place(double s, double v, double w) => Middle + (Along * s) + (Up * v) + (Across * w);

    /// <summary>Whether a place lies between the margins.</summary>
    public bool Contains(Vec3 p)
    {
        (double s, double v, double w) = Inside(p);
        return w > boundsA.Min && w < boundsB.Max && w > Rest(0, s, v) && w < Rest(1, s, v);
    }

    /// <summary>Where a margin runs: w of margin A (0) or B (1) at (s, v) [m].</summary>
    public double Rest(int side, double s, double v)
    {
        double width = widthM * (1 + (taperPerM * s)) * (1 + (jump * (SmoothStep((s - jumpAtM) / 0.8) - 0.5))), own = 1;
        double toTip = (tipAtM - (tipSide * s)) / tipLengthM;
        if (toTip < 1)
        {
            // Beyond its end both margins are one surface, so that nothing lies between them.
            double x = 1 - Math.Max(0, toTip);
            own = Math.Sqrt(1 - (x * x));
            width *= own;
        }

        double middle = (0.5 * bendPerM * s * s) + Sum(shared, s, v);
        return side == 0 ? middle - (width / 2) + (own * Sum(ownA, s, v)) : middle + (width / 2) + (own * Sum(ownB, s, v));
    }

    /// <summary>Upward-B gradient direction of a margin at (s, v): its unit normal from A to B, local frame.</summary>
    public Vec3 MarginNormal(int side, double s, double v)
    {
        const double h = 1e-4;
        double ds = (Rest(side, s + h, v) - Rest(side, s - h, v)) / (2 * h);
        double dv = (Rest(side, s, v + h) - Rest(side, s, v - h)) / (2 * h);
        return (Across - (Along * ds) - (Up * dv)).Unit();
    }

    /// <summary>Signed distance from a margin, positive toward B [m], along the perpendicular from the place.</summary>
    public double SignedDistance(int side, Vec3 p)
    {
        (double s, double v, _) = Inside(p);
        Vec3 foot = p, n = MarginNormal(side, s, v);
        double distance = 0;
        for (int round = 0; round < 4; round++)
        {
            // Slide along the normal of the last foot onto the margin, then take the normal there: the waves are long
            // against their height, so this settles at once.
            (s, v, double w) = Inside(foot);
            distance += (w - Rest(side, s, v)) * n.Dot(Across);
            foot = p - (n * distance);
            (s, v, _) = Inside(foot);
            n = MarginNormal(side, s, v);
        }

        return distance;
    }

    /// <summary>Unit normal from A to B midway between the margins nearest to a place.</summary>
    public Vec3 MeanNormal(Vec3 p)
    {
        (double s, double v, _) = Inside(p);
        return (MarginNormal(0, s, v) + MarginNormal(1, s, v)).Unit();
    }

    /// <summary>True width: distance of the margins along the mean normal through the middle nearest to a place [m].</summary>
    public double WidthAt(Vec3 p)
    {
        (double s, double v, _) = Inside(p);
        Vec3 middle = Place(s, v, (Rest(0, s, v) + Rest(1, s, v)) / 2), n = MeanNormal(p);
        return AlongNormal(1, middle, n) - AlongNormal(0, middle, n);
    }

    /// <summary>Where along a ray the margins could first be met; the end when nowhere.</summary>
    public double ComesNear(Vec3 from, Vec3 toward, double start, double end)
    {
        double w = (from - Middle).Dot(Across), speed = toward.Dot(Across);
        return SiteBox.Clip(w, speed, boundsA.Min, boundsB.Max, ref start, ref end) ? start : end;
    }

    /// <summary>Adds the places where a ray crosses a margin, in no order.</summary>
    public void AddCrossings(Vec3 from, Vec3 toward, double start, double end, CrossingList found)
    {
        (double s0, double v0, double w0) = Inside(from);
        double sd = toward.Dot(Along), vd = toward.Dot(Up), wd = toward.Dot(Across);
        for (int side = 0; side < 2; side++)
        {
            (double min, double max) = side == 0 ? boundsA : boundsB;
            double a = start, b = end;
            if (Math.Abs(wd) < 1e-9)
            {
                if (w0 < min || w0 > max) continue;
            }
            else
            {
                double ta = (min - w0) / wd, tb = (max - w0) / wd;
                if (ta > tb) (ta, tb) = (tb, ta);
                a = Math.Max(a, ta);
                b = Math.Min(b, tb);
                if (a >= b) continue;
            }

            int steps = Math.Max(1, (int)Math.Ceiling((b - a) / 0.3));
            double t = a, gap = Gap(side, t, s0, v0, w0, sd, vd, wd);
            for (int i = 1; i <= steps; i++)
            {
                double next = a + ((b - a) * i / steps), nextGap = Gap(side, next, s0, v0, w0, sd, vd, wd);
                if ((gap > 0) != (nextGap > 0))
                {
                    double lo = t, hi = next, gLo = gap, gHi = nextGap;
                    for (int k = 0; k < 40 && hi - lo > 1e-6; k++)
                    {
                        // False position kept away from the ends, so that it always closes in.
                        double share = Math.Clamp(gLo / (gLo - gHi), 0.02, 0.98), mid = lo + ((hi - lo) * share);
                        double g = Gap(side, mid, s0, v0, w0, sd, vd, wd);
                        if ((g > 0) == (gLo > 0)) (lo, gLo) = (mid, g);
                        else (hi, gHi) = (mid, g);
                        if (Math.Abs(g) < 1e-7)
                        {
                            lo = hi = mid;
                        }
                    }

                    found.Add((lo + hi) / 2, Number, side);
                }

                (t, gap) = (next, nextGap);
            }
        }
    }

    private double Gap(int side, double t, double s0, double v0, double w0, double sd, double vd, double wd) =>
        w0 + (t * wd) - Rest(side, s0 + (t * sd), v0 + (t * vd));

    private double AlongNormal(int side, Vec3 from, Vec3 n)
    {
        double t = 0;
        for (int round = 0; round < 8; round++)
        {
            (double s, double v, double w) = Inside(from + (n * t));
            t += (Rest(side, s, v) - w) / n.Dot(Across);
        }

        return t;
    }

    private (double Min, double Max) Bounds(double reachM, int side)
    {
        double min = double.PositiveInfinity, max = double.NegativeInfinity;
        for (double s = -0.75 * reachM; s <= 0.75 * reachM; s += 0.25)
        {
            for (double v = -16; v <= 16; v += 0.5)
            {
                double rest = Rest(side, s, v);
                min = Math.Min(min, rest);
                max = Math.Max(max, rest);
            }
        }

        return (min - 0.02, max + 0.02);
    }

    private static Wave[] MakeWaves(ref Dice dice, double sigma, double shortest, double longest)
    {
        var waves = new Wave[Waves];
        double amplitude = sigma * Math.Sqrt(2.0 / Waves);
        for (int i = 0; i < Waves; i++)
        {
            double k = 2 * Math.PI / dice.Between(shortest, longest), turn = dice.Between(0, Math.PI);
            waves[i] = new(amplitude, k * Math.Cos(turn), k * Math.Sin(turn), dice.Between(0, 2 * Math.PI));
        }

        return waves;
    }

    private static double Sum(Wave[] waves, double s, double v)
    {
        double sum = 0;
        foreach (Wave w in waves) sum += w.Amplitude * Math.Sin((w.Ks * s) + (w.Kv * v) + w.Phase);
        return sum;
    }

    private static double Sign(ref Dice dice) => dice.Chance(0.5) ? 1 : -1;

    private static double SmoothStep(double x)
    {
        double f = Math.Clamp(x, 0, 1);
        return f * f * (3 - (2 * f));
    }

    private static double Wrap180(double deg) => ((deg % 180) + 180) % 180;

    private readonly record struct Wave(double Amplitude, double Ks, double Kv, double Phase);
}
