using CloudStruct.Maths.Blocks;

namespace CloudStruct.Stages.Classify;

/// <summary>Where the margins of one dike run in detail: the sheet plus what the outline's own edge says, fitted locally and
/// robustly, so that shaded or stained rock beside a margin is not taken in where the rest of the margin speaks against it.</summary>
/// <remarks>The sheet has one knot every width or so and misses undulations of some centimetres; the outline follows them but
/// bulges where host beside it looks like dike (measured on simulated outcrops: most of the wrongly taken rock lay in bulges
/// of 10 cm to 1 m, not along the edge). A plane through the trace within a step or two, with Tukey's bisquare weights
/// (tuning 4.685, common practice), keeps the undulation and drops the bulges.</remarks>
internal sealed class MarginFit
{
    /// <summary>Edge of the cells of (s, v) at which a margin is fitted, and how far its trace counts there [m].</summary>
    private const double CellM = 0.5, NearM = 1.25, FarM = 2.5;

    /// <summary>A margin seldom turns from the sheet by more than this slope: ridge of the local fit.</summary>
    private const double SlopeSigma = 0.08;

    private readonly Sheet sheet;
    private readonly double leastSigmaM, looseSigmaM;
    private double farthestM;
    private readonly Local[][] fits = [[], []];   // per margin a rectangle of cells, S first; those without a fit have no scatter
    private readonly (int S, int V, int Ss, int Vs)[] cells = new (int, int, int, int)[2];

    private MarginFit(Sheet sheet, double leastSigmaM)
    {
        this.sheet = sheet;
        this.leastSigmaM = leastSigmaM;
        looseSigmaM = (0.12 * sheet.WidthM) + 0.04;
    }

    /// <summary>Offset of a margin from the sheet (outward positive) at a cell's middle, its slopes, and the scatter of the trace.</summary>
    private readonly record struct Local(double Offset, double AlongS, double AlongV, double SigmaM);

    /// <summary>A place on the edge of the outline.</summary>
    /// <param name="S">Along strike [m].</param>
    /// <param name="V">In the plane, square to strike [m].</param>
    /// <param name="Out">Distance outside the sheet's margin [m].</param>
    private readonly record struct Edge(double S, double V, double Out);

    /// <summary>Median scatter of the trace about the fitted margins [m]; NaN when no margin could be fitted.</summary>
    public double ScatterM { get; private set; } = double.NaN;

    /// <summary>Fits both margins.</summary>
    /// <param name="sheet">The sheet.</param>
    /// <param name="places">Places on the edge of the outline, local frame [m].</param>
    /// <param name="leastSigmaM">Least scatter believed: places on the edge are known no better [m].</param>
    /// <param name="threads">Workers.</param>
    public static MarginFit Of(Sheet sheet, List<(float X, float Y, float Z)> places, double leastSigmaM, int threads)
    {
        var fit = new MarginFit(sheet, leastSigmaM);
        var edges = new[] { new Dictionary<(int, int), List<Edge>>(), new Dictionary<(int, int), List<Edge>>() };
        foreach ((float x, float y, float z) in places)
        {
            (double s, double v, double t) = sheet.At(x, y, z);
            (double a, double b) = sheet.Margins(s, v);
            int side = t < (a + b) / 2 ? 0 : 1;
            double beyond = side == 0 ? a - t : t - b;
            // The edge of an island in the middle is no margin.
            if (beyond < -0.35 * (b - a)) continue;
            (int, int) cell = CellOf(s, v);
            if (!edges[side].TryGetValue(cell, out List<Edge>? list)) edges[side][cell] = list = [];
            list.Add(new Edge(s, v, beyond));
        }

        var scatter = new List<double>();
        for (int side = 0; side < 2; side++)
        {
            (int S, int V)[] at = [.. edges[side].Keys];
            if (at.Length == 0) continue;
            Dictionary<(int, int), List<Edge>> own = edges[side];
            var locals = new Local?[at.Length];
            BlockParallel.For(at.Length, threads, CancellationToken.None, (from, to) =>
            {
                for (int k = from; k < to; k++) locals[k] = fit.At(own, at[k]);
            }, length: 16);
            int s0 = at.Min(c => c.S), v0 = at.Min(c => c.V), ss = at.Max(c => c.S) - s0 + 1, vs = at.Max(c => c.V) - v0 + 1;
            fit.cells[side] = (s0, v0, ss, vs);
            fit.fits[side] = new Local[(long)ss * vs];
            for (int k = 0; k < at.Length; k++)
            {
                if (locals[k] is not { } local) continue;
                fit.fits[side][((at[k].S - s0) * vs) + at[k].V - v0] = local;
                scatter.Add(local.SigmaM);
                // The farthest that a fit is asked for is the fourth ring.
                fit.farthestM = Math.Max(fit.farthestM, Math.Abs(local.Offset) + (4.5 * CellM * (Math.Abs(local.AlongS) + Math.Abs(local.AlongV))));
            }
        }

        scatter.Sort();
        if (scatter.Count > 0) fit.ScatterM = scatter[scatter.Count / 2];
        return fit;
    }

    /// <summary>Log odds that follow from the place: how surely a place lies between the fitted margins.</summary>
    /// <param name="x">Easting, local [m].</param>
    /// <param name="y">Northing, local [m].</param>
    /// <param name="z">Height, local [m].</param>
    /// <param name="most">Largest log odds for inside: rock that looks otherwise may still be a raft of host.</param>
    public double Pull(float x, float y, float z, double most) =>
        // ln of Φ(d/σ)/Φ(-d/σ) is 1.6 d/σ near 0.
        Math.Clamp(1.6 * DepthInSigmas(x, y, z, out _), -5, most);

    /// <summary>Width of the sheet [m].</summary>
    public double WidthM => sheet.WidthM;

    /// <summary>Depth inside the fitted margins over the scatter of the nearer one.</summary>
    public double DepthInSigmas(float x, float y, float z, out double depthM)
    {
        (double s, double v, double t) = sheet.At(x, y, z);
        (double a, double b) = sheet.Margins(s, v);
        bool nearA = t < (a + b) / 2;
        (double offset, double sigma) = Offset(nearA ? 0 : 1, s, v);
        double end = sheet.Beyond(s);
        depthM = (nearA ? t - a : b - t) + offset;
        if (end > 0) depthM = Math.Min(depthM, -end);
        return depthM / sigma;
    }

    /// <summary>No more than the distance of a place from the fitted margins [m]; 0 beyond the ends.</summary>
    public double Off(float x, float y, float z)
    {
        (double s, double v, double t) = sheet.At(x, y, z);
        (double a, double b) = sheet.Margins(s, v);
        return sheet.Beyond(s) > 0 ? 0 : Math.Min(Math.Abs(t - a), Math.Abs(b - t)) - farthestM;
    }

    private static (int, int) CellOf(double s, double v) => ((int)Math.Floor(s / CellM), (int)Math.Floor(v / CellM));

    private (double OffsetM, double SigmaM) Offset(int side, double s, double v)
    {
        // The mean of the fits about, the nearer the heavier; where the trace is hidden the sheet itself, loosely.
        (int cs, int cv) = CellOf(s, v);
        double sum = 0, sigma = 0, weight = 0;
        Local[] own = fits[side];
        (int firstS, int firstV, int ss, int vs) = cells[side];
        for (int ring = 1; ring <= 4 && weight == 0; ring += 1)
        {
            for (int i = Math.Max(cs - ring, firstS); i <= Math.Min(cs + ring, firstS + ss - 1); i++)
            {
                for (int j = Math.Max(cv - ring, firstV); j <= Math.Min(cv + ring, firstV + vs - 1); j++)
                {
                    Local f = own[((i - firstS) * vs) + j - firstV];
                    if (!(f.SigmaM > 0)) continue;
                    double ds = s - ((i + 0.5) * CellM), dv = v - ((j + 0.5) * CellM), w = 1 / (0.05 + (ds * ds) + (dv * dv));
                    sum += w * (f.Offset + (f.AlongS * ds) + (f.AlongV * dv));
                    sigma += w * f.SigmaM;
                    weight += w;
                }
            }

            // Farther off the margin is less well known.
            if (ring > 1) sigma += weight * 0.04 * (ring - 1);
        }

        return weight > 0 ? (sum / weight, sigma / weight) : (0, looseSigmaM);
    }

    private Local? At(Dictionary<(int, int), List<Edge>> edges, (int S, int V) cell)
    {
        double s0 = (cell.S + 0.5) * CellM, v0 = (cell.V + 0.5) * CellM;
        int reach = (int)Math.Ceiling(FarM / CellM);
        var near = new List<(Edge Edge, double D2)>();
        for (int i = -reach; i <= reach; i++)
        {
            for (int j = -reach; j <= reach; j++)
            {
                if (!edges.TryGetValue((cell.S + i, cell.V + j), out List<Edge>? list)) continue;
                foreach (Edge e in list)
                {
                    double d2 = ((e.S - s0) * (e.S - s0)) + ((e.V - v0) * (e.V - v0));
                    if (d2 < FarM * FarM) near.Add((e, d2));
                }
            }
        }

        if (near.Count < 12) return null;
        (double middle, double scale) = MedianAndScale([.. near.Select(n => n.Edge.Out)]);
        double offset = middle, along = 0, up = 0;
        Span<double> m = stackalloc double[9];
        Span<double> y = stackalloc double[3];
        for (int round = 0; round < 4; round++)
        {
            double limit = 4.685 * Math.Max(scale, leastSigmaM);
            m.Clear();
            y.Clear();
            double total = 0;
            foreach ((Edge e, double d2) in near)
            {
                double ds = e.S - s0, dv = e.V - v0, r = (e.Out - offset - (along * ds) - (up * dv)) / limit;
                if (r * r >= 1) continue;
                double kernel = Math.Exp(-d2 / (NearM * NearM)), w = (1 - (r * r)) * (1 - (r * r)) * kernel;
                total += w;
                m[0] += w;
                m[1] += w * ds;
                m[2] += w * dv;
                m[4] += w * ds * ds;
                m[5] += w * ds * dv;
                m[8] += w * dv * dv;
                y[0] += w * e.Out;
                y[1] += w * ds * e.Out;
                y[2] += w * dv * e.Out;
            }

            if (total < 1e-3) break;
            // In units of the trace's own scatter, with some ten independent places in reach.
            double ridge = total / 10 * Math.Max(scale, leastSigmaM) * Math.Max(scale, leastSigmaM) / (SlopeSigma * SlopeSigma);
            (offset, along, up) = Solve(m[0], m[1], m[2], m[4] + ridge, m[5], m[8] + ridge, y[0], y[1], y[2]);
            double[] residuals = [.. near.Where(n => n.D2 < 2 * NearM * NearM).Select(n => Math.Abs(n.Edge.Out - offset - (along * (n.Edge.S - s0)) - (up * (n.Edge.V - v0)))).Order()];
            if (residuals.Length > 0) scale = 1.4826 * residuals[residuals.Length / 2];
        }

        return new Local(offset, along, up, Math.Max(scale, leastSigmaM));
    }

    private static (double Middle, double Scale) MedianAndScale(double[] values)
    {
        Array.Sort(values);
        double middle = values[values.Length / 2];
        double[] off = [.. values.Select(v => Math.Abs(v - middle)).Order()];
        return (middle, 1.4826 * off[off.Length / 2]);
    }

    /// <summary>Solution of the symmetric system [a b c; b d e; c e f] x = (p, q, r).</summary>
    private static (double X, double Y, double Z) Solve(double a, double b, double c, double d, double e, double f, double p, double q, double r)
    {
        double ca = (d * f) - (e * e), cb = (c * e) - (b * f), cc = (b * e) - (c * d), det = (a * ca) + (b * cb) + (c * cc);
        double cd = (a * f) - (c * c), ce = (b * c) - (a * e), cf = (a * d) - (b * b);
        return (((ca * p) + (cb * q) + (cc * r)) / det, ((cb * p) + (cd * q) + (ce * r)) / det, ((cc * p) + (ce * q) + (cf * r)) / det);
    }
}
