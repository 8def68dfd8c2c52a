using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Faces;

/// <summary>A labelling of the points and the plane of every label. Label 0 is no face; label k has Planes[k].</summary>
internal sealed class Pieces
{
    private const int LeastPerPart = 1 << 15;

    public Pieces(int points)
    {
        Label = new int[points];
        Planes = [default];
        Starts = [0, points];
        Members = [];
    }

    /// <summary>Label per point.</summary>
    public int[] Label { get; set; }

    /// <summary>Plane per label; entry 0 is unused.</summary>
    public List<PlaneFit> Planes { get; }

    /// <summary>Members of label k are Members[Starts[k]] .. Members[Starts[k + 1] - 1], ascending.</summary>
    public int[] Starts { get; private set; }

    /// <summary>Point indices sorted by label.</summary>
    public int[] Members { get; private set; }

    /// <summary>Labels in use, label 0 included.</summary>
    public int Count => Planes.Count;

    /// <summary>Points of a label, after <see cref="Sort"/>.</summary>
    public ReadOnlySpan<int> Of(int label) => Members.AsSpan(Starts[label], Starts[label + 1] - Starts[label]);

    /// <summary>Sorts the points by label.</summary>
    /// <param name="threads">Workers, each with a run of the points; the order is the same with any number.</param>
    public void Sort(int threads)
    {
        int[] label = Label;
        int labels = Planes.Count, parts = Math.Clamp(label.Length / LeastPerPart, 1, Math.Max(1, threads));
        int Edge(int part) => (int)((long)label.Length * part / parts);
        var next = new int[parts * labels];
        BlockParallel.For(parts, parts, CancellationToken.None, (from, to) =>
        {
            for (int part = from; part < to; part++)
            {
                Span<int> count = next.AsSpan(part * labels, labels);
                for (int i = Edge(part), end = Edge(part + 1); i < end; i++) count[label[i]]++;
            }
        }, 1);
        Starts = new int[labels + 1];
        int sum = 0;
        for (int k = 0; k < labels; k++)
        {
            Starts[k] = sum;
            for (int part = 0; part < parts; part++)
            {
                ref int at = ref next[(part * labels) + k];
                (at, sum) = (sum, sum + at);
            }
        }

        Starts[labels] = sum;
        if (Members.Length != label.Length) Members = new int[label.Length];
        int[] members = Members;
        BlockParallel.For(parts, parts, CancellationToken.None, (from, to) =>
        {
            for (int part = from; part < to; part++)
            {
                Span<int> place = next.AsSpan(part * labels, labels);
                for (int i = Edge(part), end = Edge(part + 1); i < end; i++) members[place[label[i]]++] = i;
            }
        }, 1);
    }

    /// <summary>Refits every plane to its points by bisquare from where it is; sorts first.</summary>
    /// <param name="surface">The points.</param>
    /// <param name="scaleM">Standard deviation of good points [m].</param>
    /// <param name="rounds">Rounds of reweighting.</param>
    public void Refit(Surface surface, double scaleM, int rounds)
    {
        Sort(surface.Threads);
        var fitted = new PlaneFit[Planes.Count];
        BlockParallel.For(
            Planes.Count,
            surface.Threads,
            surface.Stop,
            (from, to) =>
            {
                for (int k = Math.Max(1, from); k < to; k++) fitted[k] = RefitOne(surface, k, scaleM, rounds);
            },
            length: 4);
        for (int k = 1; k < Planes.Count; k++) Planes[k] = fitted[k];
    }

    /// <summary>Drops empty and undersized labels and closes the numbering; order is kept.</summary>
    /// <param name="smallest">Fewest points.</param>
    /// <param name="threads">Workers.</param>
    public void Compact(int smallest, int threads)
    {
        Sort(threads);
        var number = new int[Planes.Count];
        int next = 1;
        for (int k = 1; k < Planes.Count; k++)
        {
            if (Starts[k + 1] - Starts[k] < smallest) continue;
            number[k] = next;
            Planes[next++] = Planes[k];
        }

        Planes.RemoveRange(next, Planes.Count - next);
        int[] label = Label;
        BlockParallel.For(label.Length, threads, CancellationToken.None, (from, to) =>
        {
            for (int i = from; i < to; i++) label[i] = number[label[i]];
        });
        Sort(threads);
    }

    private PlaneFit RefitOne(Surface surface, int label, double scaleM, int rounds)
    {
        PlaneFit plane = Planes[label];
        ReadOnlySpan<int> points = Of(label);
        if (points.Length < 6) return plane;
        double limit = RobustPlane.RefitConstant * scaleM;
        for (int round = 0; round < rounds; round++)
        {
            var sums = new Moments(plane.Centroid);
            sums.AddNear(surface.X, surface.Y, surface.Z, points, plane, limit);
            if (!(sums.Weight > 5)) return plane;
            plane = PlaneFit.From(sums);
        }

        return plane;
    }
}
