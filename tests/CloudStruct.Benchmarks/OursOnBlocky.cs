using System.Diagnostics;
using System.Runtime.InteropServices;
using System.Text.Json;
using CloudStruct.Formats;
using CloudStruct.Maths.Kernels;
using CloudStruct.Maths.Neighbours;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Stages.Describe;
using CloudStruct.Stages.Faces;
using CloudStruct.Stages.Intake;
using CloudStruct.Stages.Thin;

namespace CloudStruct.Benchmarks;

/// <summary>Our kernels on the cloud of <see cref="BlockyCloud"/>, each from unsorted columns to its result, told as the programs of against-libraries tell theirs.</summary>
internal sealed class OursOnBlocky
{
    private const double NormalRadiusM = 3.1 * BlockyCloud.SpacingM;

    private readonly string path, folder;
    private readonly BlockyTruth truth;
    private readonly int threads = Environment.ProcessorCount;

    /// <summary>Reads the cloud.</summary>
    public OursOnBlocky(string path, string folder)
    {
        (this.path, this.folder) = (path, folder);
        truth = new BlockyTruth(path);
    }

    private float[] X => truth.X;

    /// <summary>Runs all kernels and prints a line of JSON for each. The first run of each is for the compiler; then once for the clock.</summary>
    public void Run()
    {
        Time("knn16", () => ExactNeighbours.Of(X, truth.Y, truth.Z, 16, threads, CancellationToken.None), Last);
        Time("radius5cm", Radius, counts => Raw("radius5cm", counts));
        Time("normals16", Normals, n => Raw("normals16", n));
        Time("voxel4cm", Voxels, _ => { });
        Time("outliers", Outliers, kept => Raw("outliers", kept));
        Time("faces", Faces, found => Raw("faces", Labels(found.Cloud, found.Faces, found.Origin)));
        Time("read_ply", () => CloudFiles.Open(path).Read(CancellationToken.None).Sum(b => { using (b) return (long)b.Count; }), _ => { });
    }

    private void Time<T>(string kernel, Func<T> work, Action<T> keep)
    {
        work();
        GC.Collect();
        var clock = Stopwatch.StartNew();
        T result = work();
        double seconds = clock.Elapsed.TotalSeconds;
        keep(result);
        using var self = Process.GetCurrentProcess();
        Console.WriteLine(JsonSerializer.Serialize(new { library = AgainstLibraries.Ours, kernel, seconds, peak_gib = self.PeakWorkingSet64 / (double)(1L << 30), note = "" }));
    }

    private void Raw<T>(string kernel, T[] values)
        where T : struct => File.WriteAllBytes(Path.Combine(folder, AgainstLibraries.Ours + "." + kernel + ".raw"), MemoryMarshal.AsBytes(values.AsSpan()));

    // The libraries count a point among its own neighbours.
    private void Last(int[] rows)
    {
        var last = new float[truth.Count];
        for (int i = 0; i < last.Length; i++)
        {
            int j = rows[(16 * i) + 14];
            float dx = X[i] - X[j], dy = truth.Y[i] - truth.Y[j], dz = truth.Z[i] - truth.Z[j];
            last[i] = (dx * dx) + (dy * dy) + (dz * dz);
        }

        Raw("knn16", last);
    }

    private (WorkingCloud Cloud, int[] Order) Sorted(double cellM)
    {
        (SortedGrid grid, int[] order) = GridBuilder.Build(X, truth.Y, truth.Z, (float)cellM, threads);
        float[] Moved(float[] column)
        {
            var moved = new float[order.Length];
            for (int i = 0; i < order.Length; i++) moved[i] = column[order[i]];
            return moved;
        }

        return (new WorkingCloud { X = Moved(X), Y = Moved(truth.Y), Z = Moved(truth.Z), Grid = grid, SpacingM = BlockyCloud.SpacingM }, order);
    }

    private int[] Radius()
    {
        (WorkingCloud cloud, int[] order) = Sorted(0.05);
        long[] starts = RadiusNeighbours.Of(cloud.Grid, cloud.X, cloud.Y, cloud.Z, 0.05f, threads, CancellationToken.None).Starts;
        var counts = new int[truth.Count];
        for (int i = 0; i < order.Length; i++) counts[order[i]] = (int)(starts[i + 1] - starts[i]);
        return counts;
    }

    private float[] Normals()
    {
        (WorkingCloud cloud, int[] order) = Sorted(NormalRadiusM);
        LocalPlanes planes = LocalPlanes.Fit(cloud, 0.999 * NormalRadiusM, threads, CancellationToken.None);
        var normals = new float[3 * truth.Count];
        for (int i = 0; i < order.Length; i++)
        {
            int to = 3 * order[i];
            (normals[to], normals[to + 1], normals[to + 2]) = (planes.NormalX[i], planes.NormalY[i], planes.NormalZ[i]);
        }

        return normals;
    }

    private int Voxels()
    {
        var table = new VoxelTable(0.04);
        foreach (PointBlock block in Pieces(out _)) table.Add(block, threads);
        return table.InOrder(threads).Length;
    }

    private byte[] Outliers()
    {
        (WorkingCloud cloud, int[] order) = Sorted(3 * BlockyCloud.SpacingM);
        var rows = new int[cloud.Count * WorkingCloud.K];
        NearestNeighbours.Fill(cloud.Grid, cloud.X, cloud.Y, cloud.Z, WorkingCloud.K, rows, null, threads, CancellationToken.None);
        StageContext context = StageContext.Plain(1, threads);
        bool[] stray = StrayPoints.Mark(cloud.Grid, StrayPoints.Reach(cloud.X, cloud.Y, cloud.Z, rows, context), rows, BlockyCloud.SpacingM, 50, context);
        var kept = new byte[truth.Count];
        for (int i = 0; i < order.Length; i++) kept[order[i]] = stray[i] ? (byte)0 : (byte)1;
        return kept;
    }

    private List<PointBlock> Pieces(out IntakeRecord record)
    {
        IPointSource source = CloudFiles.Open(path);
        IPieces pieces = new IntakeStage().Run(new SurveyInput { Name = source.Header.Name, Sources = [source] }, new IntakeSettings(), StageContext.Plain(1, threads));
        record = pieces.Record;
        return [.. pieces.Read(CancellationToken.None)];
    }

    // As a run does it, reading and thinning included.
    private (WorkingCloud Cloud, FaceSet Faces, Vec3 Origin) Faces()
    {
        StageContext context = StageContext.Plain(1, threads);
        List<PointBlock> blocks = Pieces(out IntakeRecord record);
        WorkingCloud cloud = new ThinStage().Run(new MemoryPieces(record, blocks), new ThinSettings(), context);
        return (cloud, new FacesStage().Run(new DescribeStage().Run(cloud, new DescribeSettings(), context), new FaceSettings(), context), record.Frame.Origin);
    }

    // Labels of the working points go to the input points nearest to them.
    private int[] Labels(WorkingCloud cloud, FaceSet faces, Vec3 origin)
    {
        var at = new Dictionary<(int, int, int), List<int>>();
        const float cell = 0.03f;
        (double ox, double oy, double oz) = (origin.X, origin.Y, origin.Z);
        for (int i = 0; i < cloud.Count; i++)
        {
            (int, int, int) key = Key(cloud.X[i] + ox, cloud.Y[i] + oy, cloud.Z[i] + oz);
            if (!at.TryGetValue(key, out List<int>? list)) at[key] = list = [];
            list.Add(i);
        }

        var labels = new int[truth.Count];
        for (int i = 0; i < labels.Length; i++)
        {
            (int kx, int ky, int kz) = Key(X[i], truth.Y[i], truth.Z[i]);
            double best = cell * cell;
            for (int dx = -1; dx <= 1; dx++)
            for (int dy = -1; dy <= 1; dy++)
            for (int dz = -1; dz <= 1; dz++)
            {
                if (!at.TryGetValue((kx + dx, ky + dy, kz + dz), out List<int>? list)) continue;
                foreach (int j in list)
                {
                    double ex = X[i] - cloud.X[j] - ox, ey = truth.Y[i] - cloud.Y[j] - oy, ez = truth.Z[i] - cloud.Z[j] - oz, d = (ex * ex) + (ey * ey) + (ez * ez);
                    if (d < best) (best, labels[i]) = (d, faces.FaceOfPoint[j]);
                }
            }
        }

        return labels;

        (int, int, int) Key(double x, double y, double z) => ((int)Math.Floor(x / cell), (int)Math.Floor(y / cell), (int)Math.Floor(z / cell));
    }
}
