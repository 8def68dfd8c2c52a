using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Contacts;

/// <summary>Attitude of one margin, or midway between both, over a stretch of strike.</summary>
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

    /// <summary>Puts a plane together with what it rests on.</summary>
    /// <param name="s">Middle of the stretch.</param>
    /// <param name="slopes">The plane against the sheet.</param>
    /// <param name="cells">Cells of the stretch that stand for it, at least one.</param>
    /// <param name="ground">Unit normal of the ground.</param>
    public static StretchFit Of(double s, PatchSlopes slopes, IReadOnlyList<TraceCell> cells, Vec3 ground)
    {
        double rms = 0;
        foreach (IGrouping<Margin, TraceCell> side in cells.GroupBy(c => c.Margin))
        {
            double[] off = [.. side.Select(c => c.At.Q - (slopes.Slope * (c.At.S - s)) - (slopes.Tilt * c.At.T))];
            double middle = off.Average();
            rms += off.Sum(o => (o - middle) * (o - middle)) / cells.Count;
        }

        Vec3[] a = [.. cells.Where(c => c.Margin == Margin.A).Select(c => c.Place)], b = [.. cells.Where(c => c.Margin == Margin.B).Select(c => c.Place)];
        Eigen3 scatter = ParallelPlanes.To(a, b).Eigen;
        Vec3 mean = cells.Aggregate(default(Vec3), (sum, c) => sum + c.Place) / cells.Count;
        return new StretchFit(
            s, slopes.Tilt, slopes.TiltVariance, slopes.Slope, slopes.SlopeVariance, slopes.SlopeTilt, Math.Sqrt(Math.Max(0, scatter.L2)),
            GroundRelief(cells, ground), Math.Sqrt(rms), cells.Count, mean, scatter.V1, Math.Sqrt(Math.Max(0, scatter.L2 + scatter.L3)));
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
