using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Intake;

/// <summary>Height differences between files that show the same ground.</summary>
/// <remarks>Each file's surface is taken as a plane in small cells of the shared ground; only cells that are smooth and not
/// steep in both files are compared, half way between both centroids, so that a different spread of points on a slope
/// does not pass for an offset. The median over cells is a pair's offset.</remarks>
internal sealed class TileHeights
{
    private const int LeastPoints = 8;
    private const int LeastCells = 12;
    private const double SteepestDeg = 40;

    // The noise of cells side by side hangs together: four cells are worth one.
    private const double CellsPerIndependent = 4;

    private readonly double edgeM, groundEdgeM;
    private readonly HashSet<long> ground;
    private readonly Dictionary<(int X, int Y, int Tile), Layers> cells = [];

    /// <summary>Heights in cells over shared columns.</summary>
    /// <param name="edgeM">Edge of a cell [m].</param>
    /// <param name="shared">Numbers of the shared columns.</param>
    /// <param name="groundEdgeM">Their edge [m].</param>
    public TileHeights(double edgeM, IEnumerable<long> shared, double groundEdgeM)
    {
        this.edgeM = edgeM;
        this.groundEdgeM = groundEdgeM;
        ground = [.. shared];
    }

    /// <summary>Takes in a block of one file.</summary>
    public void Add(PointBlock block)
    {
        Span<float> x = block.X, y = block.Y, z = block.Z;
        for (int i = 0; i < block.Count; i++)
        {
            var p = new Vec3(x[i], y[i], z[i]);
            if (!ground.Contains(Columns.Key(p, groundEdgeM))) continue;
            var key = ((int)Math.Floor(p.X / edgeM), (int)Math.Floor(p.Y / edgeM), block.Tile);
            if (!cells.TryGetValue(key, out Layers? layers)) cells[key] = layers = new Layers(p.Z);
            layers.Add(p, new Vec3((key.Item1 + 0.5) * edgeM, (key.Item2 + 0.5) * edgeM, layers.FirstZ));
        }
    }

    /// <summary>Offsets of all pairs of files that share enough smooth ground.</summary>
    public List<TileOffset> Offsets()
    {
        var differences = new SortedDictionary<(int A, int B), List<double>>();
        foreach (var place in cells.Where(c => IsSmooth(c.Value)).GroupBy(c => (c.Key.X, c.Key.Y)).OrderBy(g => g.Key))
        {
            (int Tile, PlaneFit Plane)[] here = [.. place.OrderBy(c => c.Key.Tile).Select(c => (c.Key.Tile, PlaneFit.From(c.Value.Sums)))];
            for (int a = 0; a < here.Length; a++)
            {
                for (int b = a + 1; b < here.Length; b++)
                {
                    (int, int) pair = (here[a].Tile, here[b].Tile);
                    if (!differences.TryGetValue(pair, out List<double>? list)) differences[pair] = list = [];
                    double x = 0.5 * (here[a].Plane.Centroid.X + here[b].Plane.Centroid.X);
                    double y = 0.5 * (here[a].Plane.Centroid.Y + here[b].Plane.Centroid.Y);
                    list.Add(HeightAt(here[b].Plane, x, y) - HeightAt(here[a].Plane, x, y));
                }
            }
        }

        var offsets = new List<TileOffset>();
        foreach (((int a, int b), List<double> list) in differences)
        {
            if (list.Count < LeastCells) continue;
            list.Sort();
            double median = list[list.Count / 2];
            double[] away = [.. list.Select(d => Math.Abs(d - median)).Order()];

            // The median of n independent values scatters by 1.25 σ/√n.
            double sigma = 1.25 * 1.4826 * away[away.Length / 2] / Math.Sqrt(list.Count / CellsPerIndependent);
            offsets.Add(new TileOffset(a, b, median, Math.Max(1e-4, sigma), list.Count));
        }

        return offsets;
    }

    private bool IsSmooth(Layers layers)
    {
        if (layers.Sums.Weight < LeastPoints || layers.HeightM > 2 * edgeM) return false;
        var plane = PlaneFit.From(layers.Sums);
        return plane.Eigen.L2 > 0.01 * edgeM * edgeM && plane.RmsM < 0.1 * edgeM && plane.Normal.Z > Math.Cos(SteepestDeg * Math.PI / 180);
    }

    private static double HeightAt(in PlaneFit plane, double x, double y) =>
        plane.Centroid.Z - (((plane.Normal.X * (x - plane.Centroid.X)) + (plane.Normal.Y * (y - plane.Centroid.Y))) / plane.Normal.Z);

    // All of a file's points over one cell; what spans much height (a wall, an overhang) is not used.
    private sealed class Layers(double firstZ)
    {
        private double low = double.MaxValue, high = double.MinValue;
        private Moments sums;
        private bool started;

        public double FirstZ { get; } = firstZ;

        public double HeightM => high - low;

        public ref readonly Moments Sums => ref sums;

        public void Add(Vec3 p, Vec3 shift)
        {
            if (!started) sums = new Moments(shift);
            started = true;
            low = Math.Min(low, p.Z);
            high = Math.Max(high, p.Z);
            sums.Add(p.X, p.Y, p.Z);
        }
    }
}
