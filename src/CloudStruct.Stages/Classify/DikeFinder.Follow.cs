using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Classify;

/// <content>Corridors, training sides, and following a sheet along strike.</content>
internal sealed partial class DikeFinder
{
    /// <summary>Cosine of 15 deg, as in the search: flatter slabs are beds or benches.</summary>
    private static readonly double SteepestPole = Math.Cos(15 * Math.PI / 180);

    /// <summary>A fold per stretch: five in turn, so that each fold has stretches from all over the sheet.</summary>
    private static int FoldOf(double s, double foldM)
    {
        int k = (int)Math.Floor(s / foldM) % Folds;
        return k < 0 ? k + Folds : k;
    }

    private StrikeOrder OrderOf(Sheet sheet, double reachM) => StrikeOrder.Of(patches, sheet, reachM, rock, taken, context.Threads, context.Stop);

    private Corridor CorridorOf(Sheet sheet, StrikeOrder order)
    {
        double width = sheet.WidthM, start = sheet.Knots[0].S, end = sheet.Knots[^1].S, foldM = Math.Max(2, width);
        int[][] parts = BlockParallel.Map(order.Patch.Length, context.Threads, context.Stop, (from, to) =>
        {
            var own = new int[to - from];
            int n = 0;
            for (int i = from; i < to; i++)
            {
                double s = order.S[i], t = order.T[i];
                (double a, double b) = sheet.Margins(s, order.V[i]);
                // Beyond the ends the sheet may bend away by some twenty degrees.
                double beyond = Math.Max(0, Math.Max(start - s, s - end)), slack = (2.2 * width) + (0.35 * beyond);
                if (t > a - slack && t < b + slack) own[n++] = i;
            }

            return own[..n];
        });
        int[] place = [.. parts.SelectMany(p => p)];
        int[] patch = new int[place.Length], fold = new int[place.Length];
        double[] along = new double[place.Length], up = new double[place.Length], across = new double[place.Length];
        for (int i = 0; i < place.Length; i++)
        {
            int p = place[i];
            (patch[i], fold[i], along[i], up[i], across[i]) = (order.Patch[p], FoldOf(order.S[p], foldM), order.S[p], order.V[p], order.T[p]);
        }

        return new Corridor(patch, fold, along, up, across);
    }

    /// <summary>Patches to learn from: well inside, and on the flanks up to most of a width away: the shaded
    /// steps and rims beside a dike must be learnt as what they are.</summary>
    private Sides SidesOf(Sheet sheet, Corridor corridor)
    {
        double start = sheet.Knots[0].S - sheet.Knots[0].HalfM, end = sheet.Knots[^1].S + sheet.Knots[^1].HalfM;
        var which = new sbyte[corridor.Patch.Length];
        BlockParallel.For(which.Length, context.Threads, context.Stop, (from, to) =>
        {
            for (int i = from; i < to; i++)
            {
                which[i] = -1;
                double s = corridor.S[i], t = corridor.T[i];
                if (s < start || s > end) continue;
                (double a, double b) = sheet.Margins(s, corridor.V[i]);
                double width = b - a, outside = Math.Max(a - t, t - b), reach = Math.Max(0.8 * width, 0.5);
                which[i] = (sbyte)(outside < -0.08 * width ? 1 : outside > 0.08 * width && outside < reach ? 0 : -1);
            }
        });
        int n = which.Count(w => w >= 0), at = 0;
        int[] patch = new int[n], fold = new int[n], place = new int[n];
        var side = new byte[n];
        for (int i = 0; i < which.Length; i++)
        {
            if (which[i] < 0) continue;
            (patch[at], side[at], fold[at], place[at]) = (corridor.Patch[i], (byte)which[i], corridor.Fold[i], i);
            at++;
        }

        return new Sides(patch, side, fold, place);
    }

    /// <summary>Fits knots along strike from the middle outward, over hidden stretches too, until the rock no longer shows it.</summary>
    private void Follow(Sheet sheet, Corridor corridor, float[] odds)
    {
        SheetFitter fitter = corridor.Fitter(patches, odds, context.Threads);
        double width = sheet.WidthM, half = Math.Max(Math.Max(0.75 * width, 0.75), 8 * patches.SizeM), step = half;
        Knot start = sheet.Knots[sheet.Knots.Count / 2];
        // A refitted sheet keeps its own knots as guesses; a fresh one is followed out of its window.
        var old = sheet.Knots.ToList();
        Knot? first = fitter.Fit(
            new Knot { S = start.S, HalfM = old.Count == 1 ? Math.Max(half, start.HalfM / 2) : half, V = start.V, A = start.A, B = start.B, G = start.G },
            0, 0.35 * width, tilts: 8, tiltSpread: old.Count == 1 ? 0.16 : 0.08);
        var knots = new List<Knot>();
        if (first != null)
        {
            double reachGap = Math.Max(4 * width, 8);
            var up = new List<Knot>();
            var down = new List<Knot>();
            BlockParallel.For(2, context.Threads, context.Stop, (way, _) => March(way == 0 ? +1 : -1, first, way == 0 ? up : down), length: 1);
            down.Reverse();
            knots = [.. down, first, .. up];

            void March(int direction, Knot from, List<Knot> into)
            {
                Knot last = from, before = from;
                double sceneEnd = direction > 0 ? corridor.S[^1] : corridor.S[0];
                int failed = 0;
                for (int k = 1; ; k++)
                {
                    double at = from.S + (direction * k * step);
                    if ((direction > 0 ? at - half > sceneEnd : at + half < sceneEnd) || Math.Abs(at - last.S) > reachGap + step) break;
                    double run = last.S - before.S, yaw = run != 0 ? (last.A + last.B - before.A - before.B - ((before.G + last.G) * (last.V - before.V))) / 2 / run : 0;
                    yaw = Math.Clamp(0.7 * yaw, -0.3, 0.3);
                    double away = at - last.S, reach = Math.Min(0.5 * width, (0.15 * width) + (0.12 * Math.Abs(away)));
                    // The width is drawn toward the usual one: tapers are slow, blemishes are not.
                    double middle = ((last.A + last.B) / 2) + (yaw * away), wide = (0.5 * (last.B - last.A)) + (0.5 * Usual(into, from, width));
                    var guess = new Knot { S = at, HalfM = half, V = last.V, A = middle - (wide / 2), B = middle + (wide / 2), G = last.G };
                    Knot? knot = fitter.Fit(guess, yaw, reach, tilts: 3, tiltSpread: 0.06);
                    if (knot == null) continue;   // nothing to be seen here: cover or a hole
                    bool holds = knot.Inside > 0.3 && (knot.AnyMargin || double.IsNaN(knot.FlankA) || double.IsNaN(knot.FlankB)) && knot.B - knot.A > 0.3 * width && knot.B - knot.A < 2.5 * width;
                    if (!holds)
                    {
                        // Something shows, but not this rock: the end, unless it is a local blemish, or soil and scree
                        // that were not told from rock (three windows alone ended dikes a fifth too early there).
                        if (++failed >= 3 && failed * step > 6) break;
                        continue;
                    }

                    failed = 0;
                    into.Add(knot);
                    (before, last) = (last, knot);
                }
            }
        }

        sheet.Knots.Clear();
        sheet.Knots.AddRange(Smoothed(knots));
    }

    /// <summary>The plane slab near the sheet that gains most log odds, over all directions within some twenty degrees.</summary>
    /// <remarks>The search's pole may be twenty degrees off where shade or a step tells the same side; followed from there, a
    /// sheet of one tilt cannot come back and what is learnt of it stays half host.</remarks>
    private Sheet Aimed(Sheet sheet, Corridor corridor, float[] odds)
    {
        Knot knot = sheet.Knots[0];
        double width = knot.B - knot.A, reach = 1.1 * width, bin = Math.Max(patches.SizeM / 2, width / 60);
        int bins = (int)Math.Ceiling(2 * reach / bin), least = (int)(0.5 * width / bin), most = (int)(1.9 * width / bin), n = odds.Length;
        double[] dx = new double[n], dy = new double[n], dz = new double[n];
        var gain = new float[n];
        for (int i = 0; i < n; i++)
        {
            int p = corridor.Patch[i];
            (dx[i], dy[i], dz[i], gain[i]) = (patches.X[p] - sheet.Origin.X, patches.Y[p] - sheet.Origin.Y, patches.Z[p] - sheet.Origin.Z, odds[i] * patches.AreaM2[p]);
        }

        Vec3 best = sheet.N;
        (double top, int from, int to) = Score(best);
        var around = new (Vec3 Normal, double Value, int From, int To)[6];
        for (double step = 12; step > 1; step /= 2)
        {
            for (int again = 0; again < 2; again++)
            {
                Vec3 about = best, e1 = Math.Abs(about.Z) < 0.9 ? about.Cross(Vec3.Up).Unit() : about.Cross(new Vec3(1, 0, 0)).Unit(), e2 = about.Cross(e1);
                double tan = Math.Tan(step * Math.PI / 180);
                BlockParallel.For(around.Length, context.Threads, context.Stop, (k, _) =>
                {
                    Vec3 near = (about + (e1 * (tan * Math.Cos(k * Math.PI / 3))) + (e2 * (tan * Math.Sin(k * Math.PI / 3)))).Unit();
                    (double value, int a, int b) = Math.Abs(near.Z) > SteepestPole ? (double.NegativeInfinity, 0, 1) : Score(near);
                    around[k] = (near, value, a, b);
                }, length: 1);
                bool moved = false;
                foreach ((Vec3 near, double value, int a, int b) in around)
                {
                    // A degree that wins nothing is not taken.
                    if (value <= top * (1 + 1e-3)) continue;
                    (top, from, to, best, moved) = (value, a, b, near, true);
                }

                if (!moved) break;
            }
        }

        double low = (from * bin) - reach, high = (to * bin) - reach;
        var aimed = new Sheet(sheet.Origin + (best * ((low + high) / 2)), best);
        aimed.Knots.Add(new Knot { S = 0, HalfM = knot.HalfM, A = -(high - low) / 2, B = (high - low) / 2 });
        return aimed;

        (double Value, int From, int To) Score(Vec3 normal)
        {
            var sum = new double[bins + 1];
            unchecked
            {
                for (int i = 0; i < gain.Length; i++)
                {
                    double t = (normal.X * dx[i]) + (normal.Y * dy[i]) + (normal.Z * dz[i]);
                    int at = (int)((t + reach) / bin) + 1;
                    if (t >= -reach && at <= bins) sum[at] += gain[i];
                }
            }

            for (int k = 1; k <= bins; k++) sum[k] += sum[k - 1];
            (double Value, int From, int To) win = (double.NegativeInfinity, 0, 1);
            for (int a = 0; a + least <= bins; a++)
            {
                for (int b = a + least; b <= Math.Min(bins, a + most); b++)
                {
                    if (sum[b] - sum[a] > win.Value) win = (sum[b] - sum[a], a, b);
                }
            }

            return win;
        }
    }

    private static double Usual(List<Knot> knots, Knot first, double width)
    {
        if (knots.Count < 2) return (first.B - first.A + width) / 2;
        double[] w = [.. knots.Select(k => k.B - k.A).Order()];
        return w[w.Length / 2];
    }

    /// <summary>Draws each knot toward its neighbours where they are sure and it is not: gains are the weights.</summary>
    private static IEnumerable<Knot> Smoothed(List<Knot> knots)
    {
        var result = new List<Knot>(knots.Count);
        for (int k = 0; k < knots.Count; k++)
        {
            Knot here = knots[k];
            double g = 0, weight = 0;
            for (int j = Math.Max(0, k - 1); j <= Math.Min(knots.Count - 1, k + 1); j++)
            {
                double w = (Math.Max(0, knots[j].Gain) + 1e-6) * (j == k ? 2 : 1);
                g += w * knots[j].G;
                weight += w;
            }

            result.Add(new Knot
            {
                S = here.S, HalfM = here.HalfM, V = here.V, A = here.A, B = here.B, G = g / weight, Gain = here.Gain,
                Inside = here.Inside, FlankA = here.FlankA, FlankB = here.FlankB,
            });
        }

        return result;
    }
}
