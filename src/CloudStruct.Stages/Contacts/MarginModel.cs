using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Contacts;
using MathNet.Numerics.Distributions;

namespace CloudStruct.Stages.Contacts;

/// <summary>Both margins over a long stretch: one normal, an offset and a taper of their own, undulation partly common. Gives the
/// plane that comes nearest to a margin over any part of it.</summary>
/// <remarks>The plane asked for is that of the surface, over a stretch of strike and the heights that show, not that of the line
/// that was seen: what lies between the traces is predicted (universal kriging, Matheron 1969, from memory), and its doubt enters
/// the region. Each margin's plane draws on the other margin as far as the undulation is common.</remarks>
internal sealed class MarginModel
{
    private const int Columns = 7, Rows = 5;   // of the grid that stands for a patch
    private const double LeastFreedom = 4;
    private const double UsualWorth = 20;   // cells that speak for the usual roughness where a stretch shows its own
    private readonly Lazy<double[]> leftOut;
    private readonly TraceCell[] cells;
    private readonly double s0, t0;
    private readonly bool both;
    private readonly (CorrelatedFit Fit, TraceNoise Noise, double Weight, double Widening)[] fits;

    private MarginModel(TraceCell[] cells, double s0, double t0, bool both, (CorrelatedFit Fit, TraceNoise Noise, double Weight, double Widening)[] fits)
    {
        this.cells = cells;
        this.s0 = s0;
        this.t0 = t0;
        this.both = both;
        this.fits = fits;
        leftOut = new Lazy<double[]>(() => fits[0].Fit.LeaveOneOut());
    }

    /// <summary>Fits; null when there are too few cells or the fit is singular.</summary>
    /// <param name="cells">Cells of one or both margins.</param>
    /// <param name="s0">About the middle of the stretch [m].</param>
    /// <param name="laws">Laws of scatter.</param>
    public static MarginModel? Of(TraceCell[] cells, double s0, TraceLaws laws)
    {
        var fits = new List<(CorrelatedFit, TraceNoise, double, double)>();
        foreach ((TraceNoise noise, double weight) in laws.Laws)
        {
            if (Solve(cells, s0, noise) is { } fit) fits.Add((fit, noise, weight, Widening(cells, noise)));
        }

        return fits.Count == 0 ? null : new MarginModel(cells, s0, cells.Average(c => c.At.T), IsBoth(cells), [.. fits]);
    }

    /// <summary>The fit under one law; null when there are too few cells or it is singular.</summary>
    public static CorrelatedFit? Solve(IReadOnlyList<TraceCell> cells, double s0, TraceNoise noise)
    {
        bool both = IsBoth(cells);
        int p = WindowModel.Parameters(both);
        if (cells.Count < p + 2) return null;
        double t0 = cells.Average(c => c.At.T), half = cells.Max(c => Math.Abs(c.At.S - s0));
        var design = new double[cells.Count * p];
        var y = new double[cells.Count];
        for (int i = 0; i < y.Length; i++)
        {
            WindowModel.Row(design.AsSpan(i * p, p), cells[i].Margin, cells[i].At.S - s0, cells[i].At.T - t0, both);
            y[i] = cells[i].At.Q;
        }

        // The sheet follows the bends already: what is left over the half length is some hundredths of it.
        var precision = new double[p];
        double sag = Math.Max(0.02 * half, 0.02), unit = noise.Noise.Sigma == 1 ? 0.0025 : 1;
        precision[WindowModel.Bend(both)] = unit * half * half * half * half / (sag * sag);
        return CorrelatedFit.Solve(design, y, noise.Covariance(cells), precision);
    }

    /// <summary>How much larger errors are over a stretch than along the dike as a whole, as a ratio of variances, at least 1: behind
    /// soil or in shade traces are rougher.</summary>
    /// <param name="margin">Side; null: both.</param>
    /// <param name="fromS">Stretch along strike [m].</param>
    /// <param name="toS">Its end [m].</param>
    public double Roughness(Margin? margin, double fromS, double toS)
    {
        double sum = UsualWorth, count = UsualWorth;
        for (int i = 0; i < cells.Length; i++)
        {
            if ((margin is { } m && cells[i].Margin != m) || cells[i].At.S < fromS || cells[i].At.S > toS) continue;
            sum += leftOut.Value[i] * leftOut.Value[i];
            count++;
        }

        return Math.Max(1, sum / count);
    }

    /// <summary>Plane nearest to a margin over a rectangle: change of q per metre up dip and along strike, with their covariance.</summary>
    /// <param name="margin">Side; null: midway between both.</param>
    /// <param name="fromS">Rectangle along strike [m].</param>
    /// <param name="toS">Its end [m].</param>
    /// <param name="fromT">Rectangle up dip [m].</param>
    /// <param name="toT">Its end [m].</param>
    public PatchSlopes Patch(Margin? margin, double fromS, double toS, double fromT, double toT)
    {
        int nodes = Columns * Rows;
        double[] s = [.. Enumerable.Range(0, nodes).Select(g => fromS + ((toS - fromS) * (g % Columns) / (Columns - 1)))];
        double[] t = [.. Enumerable.Range(0, nodes).Select(g => fromT + ((toT - fromT) * (g / Columns) / (Rows - 1)))];
        double ms = s.Average(), mt = t.Average(), ss = s.Sum(v => (v - ms) * (v - ms)), tt = t.Sum(v => (v - mt) * (v - mt));
        double[] alongS = [.. s.Select(v => (v - ms) / ss)], upT = [.. t.Select(v => (v - mt) / tt)], sum = [.. alongS.Zip(upT, (a, b) => a + b)];
        double total = 0, tilt = 0, slope = 0, vt = 0, vs = 0, mixed = 0;
        foreach ((CorrelatedFit fit, TraceNoise noise, double weight, double widening) in fits)
        {
            double[] near = Nearness(noise, s, t), own = Own(noise, s, t);
            (double Value, double Variance) T = Of(fit, noise, margin, near, own, s, t, upT), S = Of(fit, noise, margin, near, own, s, t, alongS);
            double cross = (Of(fit, noise, margin, near, own, s, t, sum).Variance - T.Variance - S.Variance) / 2;
            (T.Variance, S.Variance, cross) = (T.Variance * widening, S.Variance * widening, cross * widening);
            total += weight;
            tilt += weight * T.Value;
            slope += weight * S.Value;
            vt += weight * (T.Variance + (T.Value * T.Value));
            vs += weight * (S.Variance + (S.Value * S.Value));
            mixed += weight * (cross + (T.Value * S.Value));
        }

        (tilt, slope) = (tilt / total, slope / total);
        double rough = Roughness(margin, fromS, toS);
        return new PatchSlopes(
            tilt, Math.Max(1e-12, rough * ((vt / total) - (tilt * tilt))), slope, Math.Max(1e-12, rough * ((vs / total) - (slope * slope))), rough * ((mixed / total) - (tilt * slope)));
    }

    // The height of the waves is judged from the few that the cells show: Student's law with as many degrees of freedom takes the
    // place of the normal one. Variances are widened by the square of the ratio of their quantiles.
    private static double Widening(TraceCell[] cells, TraceNoise noise)
    {
        double sum = 0;
        for (int i = 0; i < cells.Length; i++)
        {
            for (int j = 0; j < i; j++)
            {
                double alike = Correlation.At(CorrelationShape.Matern32, TraceNoise.Distance(cells[i].At.S - cells[j].At.S, cells[i].At.T - cells[j].At.T), noise.WaveRangeM);
                sum += 2 * alike * (cells[i].Margin == cells[j].Margin ? 1 : noise.Shared);
            }
        }

        double waves = (double)cells.Length * cells.Length / (sum + cells.Length);
        double ratio = StudentT.InvCDF(0, 1, Math.Max(LeastFreedom, waves - 2), 0.975) / 1.959963985;
        return ratio * ratio;
    }

    // Covariance of the undulation of one margin at each node with that of the same margin at each cell.
    private double[] Nearness(TraceNoise noise, double[] s, double[] t)
    {
        var k = new double[s.Length * cells.Length];
        for (int g = 0; g < s.Length; g++)
        {
            for (int i = 0; i < cells.Length; i++) k[(g * cells.Length) + i] = noise.WaveAt(TraceNoise.Distance(s[g] - cells[i].At.S, t[g] - cells[i].At.T));
        }

        return k;
    }

    private static double[] Own(TraceNoise noise, double[] s, double[] t)
    {
        var k = new double[s.Length * s.Length];
        for (int g = 0; g < s.Length; g++)
        {
            for (int h = 0; h < s.Length; h++) k[(g * s.Length) + h] = noise.WaveAt(TraceNoise.Distance(s[g] - s[h], t[g] - t[h]));
        }

        return k;
    }

    private (double Value, double Variance) Of(CorrelatedFit fit, TraceNoise noise, Margin? margin, double[] near, double[] own, double[] s, double[] t, double[] weights)
    {
        int p = WindowModel.Parameters(both);
        Span<double> row = stackalloc double[p], one = stackalloc double[p];
        row.Clear();
        for (int g = 0; g < weights.Length; g++)
        {
            foreach (Margin side in (ReadOnlySpan<Margin>)[Margin.A, Margin.B])
            {
                double share = margin is { } m ? (m == side ? 1 : 0) : 0.5;
                WindowModel.Row(one, side, s[g] - s0, t[g] - t0, both);
                for (int j = 0; j < p; j++) row[j] += share * weights[g] * one[j];
            }
        }

        var toData = new double[cells.Length];
        for (int i = 0; i < toData.Length; i++)
        {
            double share = margin is { } m ? (m == cells[i].Margin ? 1 : noise.Shared) : (1 + noise.Shared) / 2, sum = 0;
            for (int g = 0; g < weights.Length; g++) sum += weights[g] * near[(g * toData.Length) + i];
            toData[i] = share * sum;
        }

        double variance = 0;
        for (int g = 0; g < weights.Length; g++)
        {
            for (int h = 0; h < weights.Length; h++) variance += weights[g] * weights[h] * own[(g * weights.Length) + h];
        }

        return fit.Predict(row, toData, variance * (margin is null ? (1 + noise.Shared) / 2 : 1));
    }

    private static bool IsBoth(IReadOnlyList<TraceCell> cells)
    {
        int a = cells.Count(c => c.Margin == Margin.A);
        return a > 0 && a < cells.Count;
    }
}
