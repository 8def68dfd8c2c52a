using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Faces;

/// <summary>Hypotheses: regions grown over the shared graph from the flattest places outward.</summary>
/// <remarks>After T. Rabbani, F. van den Heuvel and G. Vosselman 2006, Segmentation of point clouds using smoothness
/// constraint, with a test against the plane of the whole region in place of the neighbour's normal, so that curved
/// surfaces do not chain. One thread: the order of regions decides, and it is linear.</remarks>
internal sealed class Growing
{
    private const int ScoreLevels = 1024;

    // A plane fitted to a short region errs more than the mean of its local normals.
    private const int FirstFit = 40;
    private const double FitGrowth = 1.3;

    private readonly Surface surface;
    private readonly double toleranceM;
    private readonly int[] queue;
    private readonly int[] touched;   // serial number of the last region that took the point in
    private int serial;

    public Growing(Surface surface, double toleranceM)
    {
        this.surface = surface;
        this.toleranceM = toleranceM;
        queue = new int[surface.Count];
        touched = new int[surface.Count];
    }

    /// <summary>Adds labels for regions among the points that have none.</summary>
    public void Into(Pieces pieces)
    {
        var tried = new bool[surface.Count];
        int[] order = Order(pieces.Label);
        for (int s = 0; s < order.Length; s++)
        {
            if ((s & 4095) == 0) surface.Stop.ThrowIfCancellationRequested();
            int seed = order[s];
            if (tried[seed] || pieces.Label[seed] != 0) continue;
            int size = Grow(seed, pieces.Label, out PlaneFit plane);
            int kept = Keep(size, plane);
            if (kept < surface.SmallestPoints)
            {
                for (int q = 0; q < size; q++) tried[queue[q]] = true;
                tried[seed] = true;
                continue;
            }

            for (int q = 0; q < kept; q++) pieces.Label[queue[q]] = pieces.Count;
            tried[seed] = true;
            pieces.Planes.Add(plane);
        }
    }

    // Points without a label, flattest surroundings first; ties by index.
    private int[] Order(int[] label)
    {
        var level = new ushort[surface.Count];
        BlockParallel.For(surface.Count, surface.Threads, surface.Stop, (from, to) =>
        {
            for (int i = from; i < to; i++) level[i] = label[i] != 0 ? ushort.MaxValue : Level(i);
        });
        var starts = new int[ScoreLevels + 1];
        foreach (ushort l in level)
        {
            if (l < ScoreLevels) starts[l + 1]++;
        }

        for (int l = 0; l < ScoreLevels; l++) starts[l + 1] += starts[l];
        var order = new int[starts[ScoreLevels]];
        for (int i = 0; i < level.Length; i++)
        {
            if (level[i] < ScoreLevels) order[starts[level[i]]++] = i;
        }

        return order;
    }

    // Mean squared sine between a point's normal and its neighbours', plus their squared distance from its tangent plane.
    // Places more than about 25 deg rough are no seeds at all.
    private ushort Level(int i)
    {
        Vec3 n = surface.Normal(i), p = surface.Place(i);
        if (!(n.Dot(n) > 0.5)) return ushort.MaxValue;
        double sum = 0;
        int count = 0;
        foreach (int j in surface.NeighboursOf(i))
        {
            if (j < 0) break;
            double c = surface.Agreement(j, n), d = n.Dot(surface.Place(j) - p) / toleranceM;
            sum += 1 - (c * c) + (0.02 * d * d);
            count++;
        }

        if (count < 4) return ushort.MaxValue;
        double score = sum / count / 0.2;
        return score >= 1 ? ushort.MaxValue : (ushort)(score * ScoreLevels);
    }

    private int Grow(int seed, int[] label, out PlaneFit plane)
    {
        serial++;
        int tail = 0;
        queue[tail++] = seed;
        touched[seed] = serial;
        Vec3 reference = surface.Normal(seed), sum = reference, normal = reference, centre = surface.Place(seed);
        var moments = new Moments(centre);
        moments.Add(centre.X, centre.Y, centre.Z);
        double nextFit = 4;
        for (int head = 0; head < tail; head++)
        {
            foreach (int j in surface.NeighboursOf(queue[head]))
            {
                if (j < 0) break;
                if (touched[j] == serial || label[j] != 0) continue;
                if (surface.Agreement(j, normal) < surface.BendCosine) continue;
                Vec3 p = surface.Place(j);
                if (Math.Abs(normal.Dot(p - centre)) > toleranceM) continue;
                touched[j] = serial;
                queue[tail++] = j;
                Vec3 n = surface.Normal(j);
                sum += n.Dot(reference) < 0 ? -n : n;
                moments.Add(p.X, p.Y, p.Z);
                if (tail < nextFit) continue;
                nextFit = tail * FitGrowth;
                centre = moments.Centroid;
                normal = tail < FirstFit ? sum.Unit() : PlaneFit.From(moments).Normal;
            }
        }

        plane = PlaneFit.From(moments);
        return tail;
    }

    // Moves the members that fit the final plane to the front of the queue.
    private int Keep(int size, in PlaneFit plane)
    {
        if (size < surface.SmallestPoints) return 0;
        int kept = 0;
        for (int q = 0; q < size; q++)
        {
            int i = queue[q];
            if (Math.Abs(surface.Distance(i, plane)) > toleranceM || surface.Agreement(i, plane.Normal) < surface.BendCosine) continue;
            (queue[kept], queue[q]) = (i, queue[kept]);
            kept++;
        }

        return kept;
    }
}
