using System.Diagnostics;
using System.Text.Json;
using CloudStruct.Formats;
using CloudStruct.Maths.Kernels;
using CloudStruct.Maths.Neighbours;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Stages.Describe;
using CloudStruct.Stages.Faces;
using CloudStruct.Stages.Intake;
using CloudStruct.Stages.Thin;
using static System.FormattableString;

namespace CloudStruct.Benchmarks;

/// <summary>Every kernel on one file, each from unsorted columns to its result: what it sorts for itself is in its time.</summary>
internal sealed class KernelsRun
{
    private const int K = WorkingCloud.K;

    // A smoothly weighted disc counts as many points as 16 neighbours and the point itself do: (1/3)² / (1/5) of its own.
    private const double NormalSpacings = 3.1;
    private const double RadiusSpacings = 2.5;
    private const double VoxelSpacings = 3;

    private readonly string path;
    private readonly int threads, runs;
    private readonly KernelFile? truth;
    private readonly float[] x, y, z;
    private readonly IntakeRecord record;
    private readonly double spacing;
    private readonly List<PointBlock> blocks = [];
    private readonly List<KernelResult> results = [];

    public KernelsRun(string path, int threads, int runs)
    {
        (this.path, this.threads, this.runs) = (path, threads, runs);
        truth = KernelFile.Read(path);
        IPieces pieces = Intake();
        record = pieces.Record;
        spacing = record.InputSpacingM;
        blocks.AddRange(pieces.Read(CancellationToken.None));
        x = [.. blocks.SelectMany(b => b.X[..b.Count].ToArray())];
        y = [.. blocks.SelectMany(b => b.Y[..b.Count].ToArray())];
        z = [.. blocks.SelectMany(b => b.Z[..b.Count].ToArray())];
    }

    /// <summary>Runs all and prints a line for each, or one JSON list.</summary>
    public void Measure(bool json)
    {
        Time("read", () => CloudFiles.Open(path).Read(CancellationToken.None).Sum(Counted), n => new() { ["million_points_per_s"] = 0, ["points"] = n });
        Time("sort into cells", () => Sorted(3 * spacing), _ => []);
        Time("16 nearest", () => ExactNeighbours.Of(x, y, z, K, threads, CancellationToken.None), rows => KernelTruth.Nearest(x, y, z, rows, K));
        Time("fixed radius", WithinRadius, found => KernelTruth.Radius(found.Cloud, found.Starts, RadiusSpacings * spacing));
        Time("normals", Normals, found => KernelTruth.Normals(truth, found.Order, found.Planes));
        Time("normals with edges", EdgeNormals, found => KernelTruth.Normals(truth, found.Order, found.Planes));
        Time("voxel thinning", Voxels, kept => new() { ["kept"] = kept });
        Time("outlier removal", Outliers, dropped => new() { ["dropped"] = dropped });
        Time("faces", Faces, found => KernelTruth.Faces(truth, record.Frame.Origin, found.Cloud, found.Faces));
        if (json) Console.WriteLine(JsonSerializer.Serialize(results, new JsonSerializerOptions { WriteIndented = true, PropertyNamingPolicy = JsonNamingPolicy.SnakeCaseLower }));
    }

    private void Time<T>(string kernel, Func<T> work, Func<T, Dictionary<string, double>> judge)
    {
        var seconds = new List<double>();
        T result = work();   // once for the compiler and the page cache
        for (int run = 0; run < runs; run++)
        {
            GC.Collect();
            var clock = Stopwatch.StartNew();
            result = work();
            seconds.Add(clock.Elapsed.TotalSeconds);
        }

        seconds.Sort();
        Dictionary<string, double> quality = judge(result);
        if (quality.ContainsKey("million_points_per_s")) quality["million_points_per_s"] = x.Length / seconds[0] / 1e6;
        results.Add(new KernelResult(kernel, x.Length, seconds[0], seconds[seconds.Count / 2], quality));
        string said = string.Join("  ", quality.Select(q => Invariant($"{q.Key} {q.Value:0.####}")));
        Console.Error.WriteLine(Invariant($"{kernel,-20} {seconds[0],7:0.000} s  (median {seconds[seconds.Count / 2]:0.000})  {said}"));
    }

    private static long Counted(SourceBlock block)
    {
        using (block) return block.Count;
    }

    private IPieces Intake()
    {
        IPointSource source = CloudFiles.Open(path);
        return new IntakeStage().Run(new SurveyInput { Name = source.Header.Name, Sources = [source] }, new IntakeSettings(), Context());
    }

    private StageContext Context() => StageContext.Plain(1, threads);

    private (WorkingCloud Cloud, int[] Order) Sorted(double cellM)
    {
        (SortedGrid grid, int[] order) = GridBuilder.Build(x, y, z, (float)cellM, threads);
        float[] Moved(float[] column)
        {
            var moved = new float[order.Length];
            for (int i = 0; i < order.Length; i++) moved[i] = column[order[i]];
            return moved;
        }

        return (new WorkingCloud { X = Moved(x), Y = Moved(y), Z = Moved(z), Grid = grid, SpacingM = spacing }, order);
    }

    private (WorkingCloud Cloud, long[] Starts) WithinRadius()
    {
        (WorkingCloud cloud, _) = Sorted(RadiusSpacings * spacing);
        return (cloud, RadiusNeighbours.Of(cloud.Grid, cloud.X, cloud.Y, cloud.Z, (float)(RadiusSpacings * spacing), threads, CancellationToken.None).Starts);
    }

    private (LocalPlanes Planes, int[] Order) Normals()
    {
        (WorkingCloud cloud, int[] order) = Sorted(NormalSpacings * spacing);
        return (LocalPlanes.Fit(cloud, 0.999 * NormalSpacings * spacing, threads, CancellationToken.None), order);
    }

    private (WorkingCloud Cloud, int[] Order) WithNeighbours()
    {
        (WorkingCloud cloud, int[] order) = Sorted(3 * spacing);
        var rows = new int[cloud.Count * K];
        NearestNeighbours.Fill(cloud.Grid, cloud.X, cloud.Y, cloud.Z, K, rows, null, threads, CancellationToken.None);
        return (cloud with { Neighbours = rows, NeighbourRadiusM = 6 * spacing }, order);
    }

    // As the describe stage does it: planes are found, handed on across edges, and fitted again.
    private (LocalPlanes Planes, int[] Order) EdgeNormals()
    {
        (WorkingCloud cloud, int[] order) = WithNeighbours();
        LocalPlanes found = LocalPlanes.Fit(cloud, 4 * spacing, threads, CancellationToken.None);
        float[] scatter = [.. found.Scatter.Where(float.IsFinite)];
        double noise = Math.Max(0.02 * spacing, 1.45 * Maths.Fitting.OrderStatistic.Nth<float>(scatter, scatter.Length / 10));
        int[] best = found.Best(cloud, 2.2 * noise, 3, threads, CancellationToken.None);
        return (found.Refit(cloud, best, 5 * spacing, 3.5 * noise, threads, CancellationToken.None), order);
    }

    private int Voxels()
    {
        var table = new VoxelTable(VoxelSpacings * spacing);
        foreach (PointBlock block in blocks) table.Add(block, threads);
        return table.InOrder(threads).Length;
    }

    private int Outliers()
    {
        (WorkingCloud cloud, _) = WithNeighbours();
        float[] reach = StrayPoints.Reach(cloud.X, cloud.Y, cloud.Z, cloud.Neighbours, Context());
        return StrayPoints.Mark(cloud.Grid, reach, cloud.Neighbours, spacing, 50, Context()).Count(s => s);
    }

    // As a run does it, thinning to the automatic spacing included; only the file is not read again.
    private (WorkingCloud Cloud, FaceSet Faces) Faces()
    {
        WorkingCloud cloud = new ThinStage().Run(new MemoryPieces(record, blocks), new ThinSettings(), Context());
        return (cloud, new FacesStage().Run(new DescribeStage().Run(cloud, new DescribeSettings(), Context()), new FaceSettings(), Context()));
    }
}
