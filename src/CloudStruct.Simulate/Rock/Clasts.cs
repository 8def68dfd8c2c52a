using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Chance;

namespace CloudStruct.Simulate.Rock;

/// <summary>Clasts of host rock in dikes: ellipsoids, the long ones roughly along the margins.</summary>
internal sealed class Clasts
{
    private const double BinM = 2;
    private readonly Massif massif;
    private readonly Dictionary<int, List<Clast>>[] bins;

    /// <summary>Draws the clasts of all dikes.</summary>
    public Clasts(Massif massif, ulong seed)
    {
        this.massif = massif;
        bins = new Dictionary<int, List<Clast>>[massif.Dikes.Length];
        for (int d = 0; d < bins.Length; d++) bins[d] = Draw(massif.Dikes[d], massif.Terrain, seed);
    }

    /// <summary>Whether a place in a dike lies in a clast.</summary>
    public bool Holds(int rock, Vec3 p)
    {
        (double s, double v, double w) = massif.Dikes[rock - 1].Inside(p);
        if (!bins[rock - 1].TryGetValue((int)Math.Floor(s / BinM), out List<Clast>? near)) return false;
        foreach (Clast c in near)
        {
            if (c.Holds(s, v, w)) return true;
        }

        return false;
    }

    private static Dictionary<int, List<Clast>> Draw(DikeSheet dike, Terrain terrain, ulong seed)
    {
        var found = new Dictionary<int, List<Clast>>();
        var dice = new Dice(seed, Purpose.Inclusions, (ulong)dike.Number);
        double share = dice.In(dike.Plan.InclusionShare);
        if (share <= 0) return found;
        double length = dike.HalfReachM, height = terrain.TopM + 4, width = dike.Rest(1, 0, 0) - dike.Rest(0, 0, 0);
        double left = share * 2 * length * height * width;
        while (left > 0)
        {
            double size = Math.Min(0.5, 0.06 * Math.Exp(0.8 * dice.Normal())), flat = dice.Between(0.35, 0.8);
            double s = dice.Between(-length, length), v = dice.Between(-height, height), turn = 0.35 * dice.Normal();
            double w = dike.Rest(0, s, v) + ((dike.Rest(1, s, v) - dike.Rest(0, s, v)) * dice.Between(0.05, 0.95));
            left -= 4.0 / 3 * Math.PI * size * size * flat * size * 0.5;   // half: v is drawn over twice the height
            var clast = new Clast(s, v, w, size, flat * size, Math.Cos(turn), Math.Sin(turn));
            for (int bin = (int)Math.Floor((s - size) / BinM); bin <= (int)Math.Floor((s + size) / BinM); bin++)
            {
                if (!found.TryGetValue(bin, out List<Clast>? list)) found[bin] = list = [];
                list.Add(clast);
            }
        }

        return found;
    }

    private readonly record struct Clast(double S, double V, double W, double LongM, double ShortM, double Cos, double Sin)
    {
        public bool Holds(double s, double v, double w)
        {
            double ds = s - S, dv = v - V, dw = w - W, along = (ds * Cos) + (dw * Sin), across = (dw * Cos) - (ds * Sin);
            return (((along * along) + (dv * dv)) / (LongM * LongM)) + (across * across / (ShortM * ShortM)) < 1;
        }
    }
}
