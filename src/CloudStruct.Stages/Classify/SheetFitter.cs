using CloudStruct.Maths.Blocks;

namespace CloudStruct.Stages.Classify;

/// <summary>Fits the margins of a sheet to log odds, knot by knot along strike.</summary>
internal sealed class SheetFitter
{
    /// <summary>Patches nearer than this see the same piece of rock: their odds are shared, not added [m²].</summary>
    public const double IndependentM2 = 0.0025;

    private const double MarginStrain = 2;

    /// <summary>Slabs of the first fit are so many that they are tried on all cores.</summary>
    private const int ManyTilts = 8;

    private readonly double patchM;
    private readonly int threads;
    private readonly double[] s, v, t;
    private readonly float[] odds, area;

    /// <summary>Takes the patches of a corridor, sorted by s.</summary>
    public SheetFitter(double patchM, double[] s, double[] v, double[] t, float[] odds, float[] area, int threads)
    {
        this.threads = threads;
        this.patchM = patchM;
        (this.s, this.v, this.t, this.odds, this.area) = (s, v, t, odds, area);
    }

    /// <summary>Patches of a stretch: indices from (inclusive) to (exclusive).</summary>
    public (int From, int To) Stretch(double from, double to) => (Lower(from), Lower(to));

    /// <summary>The best margins near a guess, over tilts and yaws near the guess.</summary>
    /// <param name="guess">Its S and HalfM are kept; the others are where the search starts.</param>
    /// <param name="yaw">Change of t with s at the guess.</param>
    /// <param name="reachM">How far a margin may move from the guess [m].</param>
    /// <param name="tilts">Tilts tried beside the guess's: ±spread in 2 n + 1 steps.</param>
    /// <param name="tiltSpread">See tilts.</param>
    /// <returns>Null when hardly a patch lies inside.</returns>
    public Knot? Fit(Knot guess, double yaw, double reachM, int tilts, double tiltSpread)
    {
        (int from, int to) = Stretch(guess.S - guess.HalfM, guess.S + guess.HalfM);
        double width = guess.B - guess.A, look = (1.5 * width) + reachM;
        var near = new List<int>();
        double sumV = 0, weightV = 0;
        for (int i = from; i < to; i++)
        {
            double off = t[i] - (guess.G * (v[i] - guess.V)) - (yaw * (s[i] - guess.S));
            if (off < guess.A - look || off > guess.B + look) continue;
            near.Add(i);
            if (off < guess.A || off > guess.B) continue;
            sumV += area[i] * v[i];
            weightV += area[i];
        }

        if (weightV < 8 * patchM * patchM) return null;
        // About the middle of what is seen, tilt and offset do not trade against each other.
        double middleV = sumV / weightV, shift = guess.G * (middleV - guess.V);
        double a0 = guess.A + shift, b0 = guess.B + shift, bin = Math.Max(patchM / 2, width / 100);
        int bins = (int)Math.Ceiling((b0 - a0 + (2 * look)) / bin) + 1;
        int aLow = Bin(a0 - reachM), aHigh = Bin(Math.Min(a0 + reachM, ((a0 + b0) / 2) - bin)), bLow = Bin(Math.Max(b0 - reachM, ((a0 + b0) / 2) + bin)), bHigh = Bin(b0 + reachM);
        var alongs = new (double S, double V, double T, double Odds)[near.Count];
        for (int k = 0; k < alongs.Length; k++)
        {
            int p = near[k];
            alongs[k] = (s[p] - guess.S, v[p] - middleV, t[p], odds[p] * area[p] / IndependentM2);
        }

        var tried = new (double Value, int A, int B)[3 * ((2 * tilts) + 1)];
        BlockParallel.For(tried.Length, tilts < ManyTilts ? 1 : threads, CancellationToken.None, () => new double[bins + 1], (from, to, sum) =>
        {
            for (int k = from; k < to; k++) tried[k] = Try(GOf((k / 3) - tilts), YOf((k % 3) - 1), sum);
        }, length: 3);
        Knot? best = null;
        double bestValue = double.NegativeInfinity;
        for (int i = -tilts; i <= tilts; i++)
        {
            for (int j = -1; j <= 1; j++)
            {
                (double value, int a, int b) = tried[(3 * (i + tilts)) + j + 1];
                double g = GOf(i);
                // A degree of tilt that wins nothing is not taken.
                double penalty = 0.002 * Math.Abs(value) * (Math.Pow(g - guess.G, 2) / 0.0076) + (0.002 * Math.Abs(value) * j * j);
                if (value - penalty <= bestValue || b <= a) continue;
                bestValue = value - penalty;
                best = new Knot { S = guess.S, HalfM = guess.HalfM, V = middleV, G = g, A = Edge(a), B = Edge(b), Gain = value };
            }
        }

        if (best != null) Judge(best, near, yaw);
        return best;

        double GOf(int i) => guess.G + (tilts == 0 ? 0 : tiltSpread * i / tilts);
        double YOf(int j) => yaw + (tilts == 0 ? 0 : 0.035 * j);

        (double Value, int A, int B) Try(double g, double y, double[] sum)
        {
            unchecked
            {
                Array.Clear(sum);
                double start = a0 - look;
                foreach ((double ds, double dv, double dt, double weight) in alongs)
                {
                    int at = Math.Clamp((int)Math.Floor((dt - (g * dv) - (y * ds) - start) / bin), 0, bins - 1) + 1;
                    sum[at] += weight;
                }

                for (int k = 1; k <= bins; k++) sum[k] += sum[k - 1];
            }

            int a = aLow, b = bLow;
            double low = double.PositiveInfinity, high = double.NegativeInfinity, total = Math.Abs(sum[bins]) + Math.Max(0, sum[Bin(b0)] - sum[Bin(a0)]);
            for (int k = aLow; k <= aHigh; k++)
            {
                double cost = sum[k] + Strain(Edge(k) - a0);
                if (cost < low) (low, a) = (cost, k);
            }

            for (int k = bLow; k <= bHigh; k++)
            {
                double win = sum[k] - Strain(Edge(k) - b0);
                if (win > high) (high, b) = (win, k);
            }

            return (sum[b] - sum[a], a, b);

            // A margin that leaves its guess by a tenth of the width has to win some percent for it: shade and scree
            // beside the dike pull, but not that much.
            double Strain(double off) => MarginStrain * total * off * off / (width * width);
        }

        int Bin(double at) => Math.Clamp((int)Math.Floor((at - (a0 - look)) / bin), 0, bins - 1);
        double Edge(int k) => a0 - look + (k * bin);
    }

    /// <summary>Mean odds inside and on the flanks of a knot, each flank as wide as half the slab.</summary>
    private void Judge(Knot knot, List<int> near, double yaw)
    {
        double width = knot.B - knot.A, flank = 0.6 * width;
        double inside = 0, wi = 0, fa = 0, wa = 0, fb = 0, wb = 0;
        foreach (int k in near)
        {
            double off = t[k] - (knot.G * (v[k] - knot.V)) - (yaw * (s[k] - knot.S));
            if (off >= knot.A && off < knot.B)
            {
                inside += odds[k] * area[k];
                wi += area[k];
            }
            else if (off < knot.A && off > knot.A - flank)
            {
                fa += odds[k] * area[k];
                wa += area[k];
            }
            else if (off >= knot.B && off < knot.B + flank)
            {
                fb += odds[k] * area[k];
                wb += area[k];
            }
        }

        double few = 0.15 * wi * 0.6;
        knot.Inside = wi > 0 ? inside / wi : double.NaN;
        knot.FlankA = wa > few ? fa / wa : double.NaN;
        knot.FlankB = wb > few ? fb / wb : double.NaN;
    }

    /// <summary>How far the margins of narrow strips lie from the sheet [m]: the median of the absolute distances, over
    /// strips where the margin can be seen on both sides.</summary>
    public double Wander(Sheet sheet, double stripM)
    {
        double width = sheet.WidthM, reach = Math.Min(0.45 * width, Math.Max(0.5, 0.25 * width)), bin = Math.Max(patchM / 2, width / 200);
        int bins = (int)Math.Ceiling(2 * reach / bin);
        var off = new List<double>();
        var sum = new double[bins + 1];
        var seen = new double[bins + 1];
        for (double at = sheet.Knots[0].S - sheet.Knots[0].HalfM; at < sheet.Knots[^1].S + sheet.Knots[^1].HalfM; at += stripM)
        {
            (int from, int to) = Stretch(at, at + stripM);
            for (int side = 0; side < 2; side++)
            {
                Array.Clear(sum);
                Array.Clear(seen);
                for (int i = from; i < to; i++)
                {
                    (double a, double b) = sheet.Margins(s[i], v[i]);
                    // Positive inward, so that both margins step from low to high odds.
                    double d = side == 0 ? t[i] - a : b - t[i];
                    if (d < -reach || d >= reach) continue;
                    int k = (int)((d + reach) / bin) + 1;
                    sum[k] += odds[i] * area[i];
                    seen[k] += area[i];
                }

                for (int k = 1; k <= bins; k++)
                {
                    sum[k] += sum[k - 1];
                    seen[k] += seen[k - 1];
                }

                double half = seen[bins / 2];
                double need = 0.25 * stripM * reach;
                if (half < need || seen[bins] - half < need) continue;
                int best = 0;
                for (int k = 1; k <= bins; k++)
                {
                    if (sum[k] < sum[best]) best = k;
                }

                off.Add(Math.Abs((best * bin) - reach));
            }
        }

        if (off.Count < 4) return double.PositiveInfinity;
        off.Sort();
        return off[off.Count / 2];
    }

    private int Lower(double at)
    {
        int i = Array.BinarySearch(s, at);
        if (i < 0) return ~i;
        while (i > 0 && s[i - 1] >= at) i--;
        return i;
    }
}
