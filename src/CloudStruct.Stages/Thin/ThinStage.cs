using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Neighbours;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Thin;

/// <summary>Brings the streamed cloud to an even spacing, drops stray points, and builds the neighbourhoods that all
/// later stages share.</summary>
/// <remarks>One real point stands for each occupied voxel, with the mean colour of the voxel. Every input point finds its
/// working point by <see cref="SortedGridLookup.Nearest"/>: it lies within one voxel diagonal, or was stray.</remarks>
public sealed class ThinStage : IStage<IPieces, ThinSettings, WorkingCloud>
{
    // Sixteen neighbours on a surface lie within about 2.3 spacings, so nearly all points are served by the first ring.
    private const float CellSpacings = 3;
    private const double LeastSpacingM = 0.01;

    // Surveys of rock hold up to some hundredths of stray points; beyond, density varies so much that sparse is not stray.
    private const double MostStray = 0.1;

    /// <inheritdoc/>
    public string Name => "thin";

    /// <inheritdoc/>
    public WorkingCloud Run(IPieces input, ThinSettings settings, StageContext context)
    {
        IntakeRecord record = input.Record;
        double spacing = settings.SpacingM ?? Spacing(record, settings);
        spacing = Math.Max(spacing, VoxelTable.SmallestEdgeM(Reach(record)));
        VoxelTable voxels = Collect(input, spacing, context);
        WorkingCloud cloud = Sort(voxels, record, spacing, context);
        cloud = WithNeighbours(cloud, context);
        if (settings.DropStray) cloud = DropStray(cloud, settings, context);
        context.Progress(1);
        return cloud;
    }

    /// <summary>Spacing that keeps most of what the input shows, rounded to two digits.</summary>
    private static double Spacing(IntakeRecord record, ThinSettings settings)
    {
        Vec3 size = record.BoxMax - record.BoxMin;
        double input = record.InputSpacingM > 0 && double.IsFinite(record.InputSpacingM) ? record.InputSpacingM : LeastSpacingM;

        // A model of a hand specimen or a printed copy is far smaller than an outcrop: 1 cm would leave nothing of it.
        double least = Math.Min(LeastSpacingM, size.Length / 500);

        // A plane cuts between 1 and 1.7 voxels per voxel face of its area: 1.4 on average over directions.
        double area = record.Points * input * input;
        double forMemory = Math.Sqrt(1.4 * area / settings.MaxPoints);
        double wanted = Math.Max(Math.Max(input, least), forMemory);
        double digit = Math.Pow(10, Math.Floor(Math.Log10(wanted)) - 1);
        return Math.Round(Math.Ceiling((wanted / digit) - 1e-9) * digit, 9);
    }

    private static double Reach(IntakeRecord record)
    {
        double reach = 1;
        foreach (Vec3 v in new[] { record.BoxMin, record.BoxMax })
        {
            reach = Math.Max(reach, Math.Max(Math.Abs(v.X), Math.Max(Math.Abs(v.Y), Math.Abs(v.Z))));
        }

        return reach;
    }

    private static VoxelTable Collect(IPieces input, double spacing, StageContext context)
    {
        var voxels = new VoxelTable(spacing);
        long done = 0;
        foreach (PointBlock block in ReadAhead.Of(input.Read(context.Stop), context.Threads))
        {
            using (block)
            {
                voxels.Add(block, context.Threads);
                done += block.Count;
                context.Progress(0.6 * done / Math.Max(1, input.Record.Points));
            }
        }

        return voxels;
    }

    private static WorkingCloud Sort(VoxelTable voxels, IntakeRecord record, double spacing, StageContext context)
    {
        int[] handles = voxels.InOrder(context.Threads);
        int n = handles.Length;
        float[] x = new float[n], y = new float[n], z = new float[n];
        BlockParallel.For(n, context.Threads, context.Stop, (from, to) =>
        {
            for (int i = from; i < to; i++)
            {
                ref Voxel v = ref voxels[handles[i]];
                (x[i], y[i], z[i]) = (v.X, v.Y, v.Z);
            }
        });

        (SortedGrid grid, int[] order) = GridBuilder.Build(x, y, z, (float)(CellSpacings * spacing), context.Threads);
        int coloured = record.HasColour ? n : 0;
        byte[] red = new byte[coloured], green = new byte[coloured], blue = new byte[coloured], cls = new byte[n];
        var support = new int[n];
        BlockParallel.For(n, context.Threads, context.Stop, (from, to) =>
        {
            for (int k = from; k < to; k++)
            {
                ref Voxel v = ref voxels[handles[order[k]]];
                (x[k], y[k], z[k]) = (v.X, v.Y, v.Z);
                support[k] = v.Count;
                cls[k] = v.Class;
                if (coloured == 0) continue;
                uint half = (uint)v.Count / 2;
                red[k] = (byte)((v.Red + half) / v.Count);
                green[k] = (byte)((v.Green + half) / v.Count);
                blue[k] = (byte)((v.Blue + half) / v.Count);
            }
        });

        return new WorkingCloud
        {
            Frame = record.Frame,
            X = x,
            Y = y,
            Z = z,
            Red = red,
            Green = green,
            Blue = blue,
            SourceClass = cls,
            Support = support,
            SpacingM = spacing,
            Grid = grid,
        };
    }

    private static WorkingCloud WithNeighbours(WorkingCloud cloud, StageContext context)
    {
        int[] neighbours = GC.AllocateUninitializedArray<int>(checked(cloud.Count * WorkingCloud.K));
        NearestNeighbours.Fill(
            cloud.Grid, cloud.X, cloud.Y, cloud.Z, WorkingCloud.K, neighbours, null, context.Threads, context.Stop);
        return cloud with { Neighbours = neighbours, NeighbourRadiusM = 2 * (double)cloud.Grid.CellM };
    }

    private static WorkingCloud DropStray(WorkingCloud cloud, ThinSettings settings, StageContext context)
    {
        float[] reach = StrayPoints.Reach(cloud.X, cloud.Y, cloud.Z, cloud.Neighbours, context);
        int clusterPoints = Math.Min(settings.StrayClusterPoints, cloud.Count / 100);
        bool[] stray = StrayPoints.Mark(cloud.Grid, reach, cloud.Neighbours, cloud.SpacingM, clusterPoints, context);
        int working = stray.Count(s => s);

        if (working == 0) return cloud;
        if (working > MostStray * cloud.Count)
        {
            context.Say(new Remark(
                "thin",
                Invariant($"{100.0 * working / cloud.Count:0.#} % of the points have hardly a neighbour. With so many this is an uneven cloud, not stray points, so nothing was dropped; faces are only found where points lie densely."),
                true));
            return cloud;
        }

        long input = 0;
        for (int i = 0; i < stray.Length; i++)
        {
            if (stray[i]) input += cloud.Support[i];
        }

        double share = 100.0 * input / Math.Max(1, cloud.Support.Sum(s => (long)s));
        context.Say(new Remark(
            "thin",
            Invariant($"{input} stray points ({share:0.###} % of the input) were dropped: too few neighbours, or far off any surface."),
            share > 5));
        return Without(cloud, stray, context) with { StrayPoints = input };
    }

    /// <summary>The cloud without some points: the rest keeps its order and cells; only points that lost a neighbour look again.</summary>
    private static WorkingCloud Without(WorkingCloud cloud, bool[] dropped, StageContext context)
    {
        var place = new int[cloud.Count];
        int n = 0;
        for (int i = 0; i < place.Length; i++) place[i] = dropped[i] ? -1 : n++;
        var source = new int[n];
        for (int i = 0; i < place.Length; i++)
        {
            if (place[i] >= 0) source[place[i]] = i;
        }

        T[] Kept<T>(T[] column)
        {
            if (column.Length == 0) return column;
            T[] kept = GC.AllocateUninitializedArray<T>(n);
            BlockParallel.For(n, context.Threads, context.Stop, (from, to) =>
            {
                for (int k = from; k < to; k++) kept[k] = column[source[k]];
            });
            return kept;
        }

        SortedGrid old = cloud.Grid;
        var keys = new List<long>(old.Keys.Length);
        var starts = new List<int>(old.Starts.Length);
        for (int c = 0, at = 0; c < old.Keys.Length; c++)
        {
            int before = at;
            for (int i = old.Starts[c]; i < old.Starts[c + 1]; i++) at += dropped[i] ? 0 : 1;
            if (at == before) continue;
            keys.Add(old.Keys[c]);
            starts.Add(before);
        }

        starts.Add(n);
        WorkingCloud kept = cloud with
        {
            X = Kept(cloud.X),
            Y = Kept(cloud.Y),
            Z = Kept(cloud.Z),
            Red = Kept(cloud.Red),
            Green = Kept(cloud.Green),
            Blue = Kept(cloud.Blue),
            SourceClass = Kept(cloud.SourceClass),
            Support = Kept(cloud.Support),
            Grid = old with { Keys = [.. keys], Starts = [.. starts] },
        };

        const int K = WorkingCloud.K;
        int[] neighbours = GC.AllocateUninitializedArray<int>(checked(n * K));
        var again = new bool[n];
        BlockParallel.For(
            n,
            context.Threads,
            context.Stop,
            (from, to) =>
            {
                for (int k = from; k < to; k++)
                {
                    ReadOnlySpan<int> before = cloud.Neighbours.AsSpan(source[k] * K, K);
                    Span<int> now = neighbours.AsSpan(k * K, K);
                    bool lost = false;
                    for (int m = 0; m < K; m++)
                    {
                        now[m] = before[m] < 0 ? -1 : place[before[m]];
                        lost |= now[m] < 0 && before[m] >= 0;
                    }

                    again[k] = lost;
                }
            });
        NearestNeighbours.Fill(kept.Grid, kept.X, kept.Y, kept.Z, K, neighbours, again, context.Threads, context.Stop);
        return kept with { Neighbours = neighbours };
    }
}
