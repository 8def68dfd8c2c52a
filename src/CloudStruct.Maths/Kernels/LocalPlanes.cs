using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Neighbours;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Maths.Kernels;

/// <summary>A weighted plane about every point of a cloud, and the choice of the best neighbouring plane near edges.</summary>
/// <remarks>Weights (1 - d²/r²)², see <see cref="LocalMoments.About"/>.</remarks>
public sealed class LocalPlanes
{
    // A refit needs as much say as three points half way to the rim have (0.56 each), or it keeps the plane it had.
    private const float LeastWeight = 1.7f;

    private LocalPlanes(int count)
    {
        NormalX = new float[count];
        NormalY = new float[count];
        NormalZ = new float[count];
        Offset = new float[count];
        Scatter = new float[count];
        Planarity = new float[count];
    }

    /// <summary>Unit normal of arbitrary sign; straight up where fewer than three points lie near.</summary>
    public float[] NormalX { get; }

    /// <summary>See <see cref="NormalX"/>.</summary>
    public float[] NormalY { get; }

    /// <summary>See <see cref="NormalX"/>.</summary>
    public float[] NormalZ { get; }

    /// <summary>Distance of the plane from the point along the normal [m].</summary>
    public float[] Offset { get; }

    /// <summary>Weighted rms of the points about the plane [m]; infinite where no plane could be fitted.</summary>
    public float[] Scatter { get; }

    /// <summary>(s2 - s3) / s1 from the roots of the eigenvalues; 0 where no plane could be fitted.</summary>
    public float[] Planarity { get; }

    /// <summary>Fits a plane about every point.</summary>
    /// <param name="cloud">Sorted points.</param>
    /// <param name="radiusM">Radius of the fit [m].</param>
    /// <param name="threads">Workers.</param>
    /// <param name="stop">Checked per block.</param>
    public static LocalPlanes Fit(WorkingCloud cloud, double radiusM, int threads, CancellationToken stop)
    {
        var planes = new LocalPlanes(cloud.Count);
        ForWindows(
            cloud,
            radiusM,
            threads,
            stop,
            (i, x, y, z) => planes.Set(i, LocalMoments.About(x, y, z, cloud.X[i], cloud.Y[i], cloud.Z[i], (float)radiusM)));
        return planes;
    }

    /// <summary>Fits the planes again, each point starting from the plane chosen for it and listening only to points near that.</summary>
    /// <param name="cloud">Sorted points.</param>
    /// <param name="source">The point whose plane each starts from.</param>
    /// <param name="radiusM">Radius of the fit [m].</param>
    /// <param name="cutM">Distance from the plane beyond which a point has no say [m].</param>
    /// <param name="threads">Workers.</param>
    /// <param name="stop">Checked per block.</param>
    public LocalPlanes Refit(WorkingCloud cloud, int[] source, double radiusM, double cutM, int threads, CancellationToken stop)
    {
        var planes = new LocalPlanes(cloud.Count);
        ForWindows(
            cloud,
            radiusM,
            threads,
            stop,
            (i, x, y, z) =>
            {
                int s = source[i];
                float passing = Passing(cloud, s, i);
                LocalMoments sums = LocalMoments.AboutPlane(
                    x, y, z, cloud.X[i], cloud.Y[i], cloud.Z[i], (float)radiusM, NormalX[s], NormalY[s], NormalZ[s], passing, (float)cutM);
                if (sums.W >= LeastWeight) planes.Set(i, sums);
                else planes.Keep(i, this, s, passing);
            });
        return planes;
    }

    /// <summary>For each point the number of the point whose plane describes it best: of its own and its neighbours'
    /// planes that pass close by, the one with the least scatter. Across an edge the own plane is tilted and scattered;
    /// the plane of a neighbour farther from the edge is not.</summary>
    /// <param name="cloud">The points, with neighbours.</param>
    /// <param name="closeM">How far a plane may pass from the point [m].</param>
    /// <param name="rounds">How often planes are handed on to the next neighbours.</param>
    /// <param name="threads">Workers.</param>
    /// <param name="stop">Checked per block.</param>
    public int[] Best(WorkingCloud cloud, double closeM, int rounds, int threads, CancellationToken stop)
    {
        var source = new int[cloud.Count];
        for (int i = 0; i < source.Length; i++) source[i] = i;
        for (int round = 0; round < rounds; round++)
        {
            int[] before = source;
            var after = new int[source.Length];
            BlockParallel.For(
                source.Length,
                threads,
                stop,
                (from, to) =>
                {
                    for (int i = from; i < to; i++) after[i] = Choose(cloud, before, i, (float)closeM);
                });
            source = after;
        }

        return source;
    }

    private int Choose(WorkingCloud cloud, int[] source, int i, float close)
    {
        int best = source[i];
        float least = Passes(cloud, best, i, close) ? Scatter[best] : float.PositiveInfinity;
        ReadOnlySpan<int> row = cloud.Neighbours.AsSpan(i * WorkingCloud.K, WorkingCloud.K);
        foreach (int j in row)
        {
            if (j < 0) break;
            int candidate = source[j];
            if (Scatter[candidate] >= least || !Passes(cloud, candidate, i, close)) continue;
            best = candidate;
            least = Scatter[candidate];
        }

        return best;
    }

    private bool Passes(WorkingCloud cloud, int plane, int i, float close) => Math.Abs(Passing(cloud, plane, i)) <= close;

    // Distance of a point's plane from another point, along the normal.
    private float Passing(WorkingCloud cloud, int plane, int i) =>
        Offset[plane]
        - (NormalX[plane] * (cloud.X[i] - cloud.X[plane]))
        - (NormalY[plane] * (cloud.Y[i] - cloud.Y[plane]))
        - (NormalZ[plane] * (cloud.Z[i] - cloud.Z[plane]));

    private static void ForWindows(WorkingCloud cloud, double radiusM, int threads, CancellationToken stop, PointBody body)
    {
        SortedGrid grid = cloud.Grid;
        (float[] x, float[] y, float[] z) = (cloud.X, cloud.Y, cloud.Z);
        int[]? order = null;
        if (radiusM > 2 * grid.CellM)
        {
            // Wider than the shared cells serve: cells of their own.
            (grid, order) = GridBuilder.Build(x, y, z, (float)(0.5001 * radiusM), threads);
            x = Array.ConvertAll(order, i => cloud.X[i]);
            y = Array.ConvertAll(order, i => cloud.Y[i]);
            z = Array.ConvertAll(order, i => cloud.Z[i]);
        }

        int ring = radiusM <= grid.CellM ? 1 : 2;
        BlockParallel.For(
            grid.Keys.Length,
            threads,
            stop,
            () => new CellWindow(grid, x, y, z, ring),
            (from, to, window) =>
            {
                window.StartAt(from);
                for (int cell = from; cell < to; cell++)
                {
                    window.Gather(cell);
                    ReadOnlySpan<float> wx = window.X.AsSpan(0, window.Padded);
                    ReadOnlySpan<float> wy = window.Y.AsSpan(0, window.Padded);
                    ReadOnlySpan<float> wz = window.Z.AsSpan(0, window.Padded);
                    for (int i = grid.Starts[cell]; i < grid.Starts[cell + 1]; i++) body(order is null ? i : order[i], wx, wy, wz);
                }
            },
            256);
    }

    private delegate void PointBody(int i, ReadOnlySpan<float> x, ReadOnlySpan<float> y, ReadOnlySpan<float> z);

    private void Keep(int i, LocalPlanes from, int s, float offset)
    {
        (NormalX[i], NormalY[i], NormalZ[i]) = (from.NormalX[s], from.NormalY[s], from.NormalZ[s]);
        (Offset[i], Scatter[i], Planarity[i]) = (offset, from.Scatter[s], from.Planarity[s]);
    }

    private void Set(int i, in LocalMoments sums)
    {
        (double l1, double l2, double l3) = SmallestAxis.Of(sums.Covariance, out Vec3 n);
        NormalX[i] = (float)n.X;
        NormalY[i] = (float)n.Y;
        NormalZ[i] = (float)n.Z;
        Offset[i] = (float)n.Dot(sums.Mean);
        bool plane = l2 > 1e-12 * l1 && l1 > 0;
        double s1 = Math.Sqrt(l1), s2 = Math.Sqrt(Math.Max(0, l2)), s3 = Math.Sqrt(l3);
        Scatter[i] = plane ? (float)s3 : float.PositiveInfinity;
        Planarity[i] = plane ? (float)((s2 - s3) / s1) : 0;
    }
}
