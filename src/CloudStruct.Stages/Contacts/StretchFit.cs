using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Contacts;

/// <summary>Attitude of one margin, or of both with a common normal, over a stretch of strike.</summary>
/// <param name="S">Middle of the stretch along strike [m].</param>
/// <param name="Tilt">Change of q per metre up dip against the sheet.</param>
/// <param name="TiltVariance">Its variance.</param>
/// <param name="Slope">Change of q per metre along strike.</param>
/// <param name="SlopeVariance">Its variance.</param>
/// <param name="SlopeTilt">Covariance of the two.</param>
/// <param name="ReliefM">Root of the second eigenvalue of the traces' scatter, each about its own centroid [m].</param>
/// <param name="GroundReliefM">Rms departure of the traces from the plane of the ground, a line along strike taken out [m].</param>
/// <param name="RmsM">Rms distance of the cells from the fit [m].</param>
/// <param name="Cells">Cells used.</param>
/// <param name="Middle">Mean place of the cells, local [m].</param>
/// <param name="Line">Direction of greatest scatter.</param>
/// <param name="LineRmsM">Rms distance of the cells from straight lines [m].</param>
internal sealed record StretchFit(
    double S, double Tilt, double TiltVariance, double Slope, double SlopeVariance, double SlopeTilt, double ReliefM,
    double GroundReliefM, double RmsM, int Cells, Vec3 Middle, Vec3 Line, double LineRmsM)
{
    /// <summary>Unit normal from A to B and the covariance of its error in the tangent plane [rad²].</summary>
    /// <param name="axes">Axes of the sheet at <see cref="S"/>.</param>
    public (Vec3 Normal, Symmetric3 Covariance) Pole(SheetAxes axes)
    {
        Vec3 raw = axes.Normal - (axes.Along * Slope) - (axes.Up * Tilt);
        double length = raw.Length;
        Vec3 n = raw / length;
        Vec3 along = (axes.Along - (n * n.Dot(axes.Along))) / length, up = (axes.Up - (n * n.Dot(axes.Up))) / length;
        Vec3 sum = along + up;
        Symmetric3 mixed = (Symmetric3.Outer(sum) + (Symmetric3.Outer(along) * -1) + (Symmetric3.Outer(up) * -1)) * SlopeTilt;
        return (n, (Symmetric3.Outer(along) * SlopeVariance) + (Symmetric3.Outer(up) * TiltVariance) + mixed);
    }

    /// <summary>Fits cells of one or both margins about s0. Null when they are too few or the fit is singular.</summary>
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

        // The sheet follows the bends already: what is left over the window's half length is some hundredths of it.
        var precision = new double[p];
        double sag = Math.Max(0.02 * half, 0.02), unit = noise.Noise.Sigma == 1 ? 0.0025 : 1;
        precision[WindowModel.Bend(both)] = unit * half * half * half * half / (sag * sag);
        return CorrelatedFit.Solve(design, y, noise.Covariance(cells), precision);
    }

    /// <summary>Fits cells of one or both margins about s0; null when they are too few or the fit is singular.</summary>
    /// <param name="cells">Cells of the stretch.</param>
    /// <param name="s0">Middle of the stretch.</param>
    /// <param name="noise">Scatter of the cells.</param>
    /// <param name="ground">Unit normal of the ground.</param>
    public static StretchFit? Of(IReadOnlyList<TraceCell> cells, double s0, TraceNoise noise, Vec3 ground)
    {
        if (Solve(cells, s0, noise) is not { } fit) return null;
        bool both = IsBoth(cells);
        int p = WindowModel.Parameters(both), tilt = WindowModel.Tilt(both);
        Span<double> slope = stackalloc double[p];
        slope.Clear();
        slope[1] = 1;
        if (both)   // each margin's strike by its certainty
        {
            double va = fit.Covariance[p + 1], vb = fit.Covariance[(3 * p) + 3];
            (slope[1], slope[3]) = (vb / (va + vb), va / (va + vb));
        }

        double value = 0, mixed = 0;
        for (int i = 0; i < p; i++)
        {
            value += slope[i] * fit.Beta[i];
            mixed += slope[i] * fit.Covariance[(i * p) + tilt];
        }

        double rms = 0, t0 = cells.Average(c => c.At.T);
        Span<double> row = stackalloc double[p];
        foreach (TraceCell c in cells)
        {
            WindowModel.Row(row, c.Margin, c.At.S - s0, c.At.T - t0, both);
            double r = c.At.Q;
            for (int i = 0; i < p; i++) r -= row[i] * fit.Beta[i];
            rms += r * r / cells.Count;
        }

        Vec3[] a = [.. cells.Where(c => c.Margin == Margin.A).Select(c => c.Place)], b = [.. cells.Where(c => c.Margin == Margin.B).Select(c => c.Place)];
        Eigen3 scatter = ParallelPlanes.To(a, b).Eigen;
        Vec3 middle = cells.Aggregate(default(Vec3), (sum, c) => sum + c.Place) / cells.Count;
        return new StretchFit(
            s0, fit.Beta[tilt], fit.Covariance[(tilt * p) + tilt], value, fit.VarianceOf(slope), mixed, Math.Sqrt(Math.Max(0, scatter.L2)),
            GroundRelief(cells, ground), Math.Sqrt(rms), cells.Count, middle, scatter.V1, Math.Sqrt(Math.Max(0, scatter.L2 + scatter.L3)));
    }

    private static bool IsBoth(IReadOnlyList<TraceCell> cells)
    {
        int a = cells.Count(c => c.Margin == Margin.A);
        return a > 0 && a < cells.Count;
    }

    private static double GroundRelief(IReadOnlyList<TraceCell> cells, Vec3 ground)
    {
        double sum = 0;
        foreach (IGrouping<Margin, TraceCell> side in cells.GroupBy(c => c.Margin))
        {
            double n = side.Count(), ms = side.Average(c => c.At.S), mh = side.Average(c => c.Place.Dot(ground)), ss = 0, sh = 0, hh = 0;
            foreach (TraceCell c in side)
            {
                double s = c.At.S - ms, h = c.Place.Dot(ground) - mh;
                ss += s * s;
                sh += s * h;
                hh += h * h;
            }

            sum += Math.Max(0, hh - (ss > 0 ? sh * sh / ss : 0));
        }

        return Math.Sqrt(sum / cells.Count);
    }
}
