using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Faces;

/// <summary>The two-plane test: a label that two planes explain much better than one is cut along the line between them.</summary>
/// <remarks>Errors are correlated, so single points say nothing: heights are averaged over cells wider than the noise length, whose means
/// are nearly independent, and the two models are compared on those by the Bayesian information criterion with the scale left
/// open. Gates on the turn keep joints that undulate whole.</remarks>
internal sealed class Splitting
{
    private const double CellOverLength = 1.5;
    private const int MostCells = 120;
    private const int FewestOnSide = 6;

    // Three parameters of the second plane and two of the line, and a margin. Less of it, and turns of 1.5 deg, cut seven sound faces
    // in a hundred along waves of the noise: errors of the pieces grew and their cones did not (coverage 0.93 to 0.90).
    private const double Parameters = 5;
    private const double Margin = 12;

    private const double LeastTurn = 4 * Math.PI / 180;

    private readonly Surface surface;
    private readonly double scatterM;
    private readonly double noiseLengthM;

    public Splitting(Surface surface, double scatterM, double noiseLengthM)
    {
        this.surface = surface;
        this.scatterM = scatterM;
        this.noiseLengthM = noiseLengthM;
    }

    /// <summary>Cuts what two planes explain better. Needs sorted pieces.</summary>
    /// <returns>How many labels were cut.</returns>
    public int Into(Pieces pieces)
    {
        int before = pieces.Count;
        var cut = new (Vec3 Across, double At)?[before];
        BlockParallel.For(
            before,
            surface.Threads,
            surface.Stop,
            (from, to) =>
            {
                for (int k = Math.Max(1, from); k < to; k++) cut[k] = Line(pieces, k);
            },
            length: 8);
        for (int k = 1; k < before; k++)
        {
            if (cut[k] is not { } line) continue;
            foreach (int i in pieces.Of(k))
            {
                if (line.Across.Dot(surface.Place(i) - pieces.Planes[k].Centroid) > line.At) pieces.Label[i] = pieces.Count;
            }

            pieces.Planes.Add(pieces.Planes[k]);
        }

        if (pieces.Count > before) pieces.Refit(surface, 2 * scatterM, 4);
        return pieces.Count - before;
    }

    private (Vec3 Across, double At)? Line(Pieces pieces, int label)
    {
        ReadOnlySpan<int> own = pieces.Of(label);
        if (own.Length < 4 * surface.SmallestPoints) return null;
        PlaneFit plane = pieces.Planes[label];
        Vec3 e1 = plane.Eigen.V1, e2 = plane.Normal.Cross(e1);
        double cell = Math.Max(CellOverLength * noiseLengthM, Math.Sqrt(own.Length * surface.PointAreaM2 / MostCells));
        (double[] u, double[] v, double[] r) = Cells(own, plane, e1, e2, cell);
        int fewest = Math.Max(FewestOnSide, (int)Math.Ceiling(surface.Settings.SmallestFaceM2 / (cell * cell)));
        if (PlaneSplit.Best(u, v, r, fewest) is not { } split || split.Turn < LeastTurn) return null;

        // Means of cells without any error left would make every fold significant.
        double floor = u.Length * 0.01 * scatterM * scatterM;
        double gain = u.Length * Math.Log((split.OneSquares + floor) / (split.TwoSquares + floor));
        if (gain < (Parameters * Math.Log(u.Length)) + Margin) return null;
        return ((e1 * Math.Cos(split.Angle)) + (e2 * Math.Sin(split.Angle)), split.At);
    }

    // Mean place and height of the cells that hold at least a third of the usual points.
    private (double[] U, double[] V, double[] R) Cells(ReadOnlySpan<int> own, PlaneFit plane, Vec3 e1, Vec3 e2, double cellM)
    {
        var sums = new SortedDictionary<(int, int), (int N, double U, double V, double R)>();
        foreach (int i in own)
        {
            Vec3 d = surface.Place(i) - plane.Centroid;
            double u = d.Dot(e1), v = d.Dot(e2);
            (int, int) key = ((int)Math.Floor(u / cellM), (int)Math.Floor(v / cellM));
            (int n, double su, double sv, double sr) = sums.GetValueOrDefault(key);
            sums[key] = (n + 1, su + u, sv + v, sr + d.Dot(plane.Normal));
        }

        double usual = cellM * cellM / surface.PointAreaM2;
        (int N, double U, double V, double R)[] kept = [.. sums.Values.Where(s => s.N >= usual / 3)];
        return ([.. kept.Select(s => s.U / s.N)], [.. kept.Select(s => s.V / s.N)], [.. kept.Select(s => s.R / s.N)]);
    }
}
