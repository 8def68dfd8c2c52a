using System.Numerics;
using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Fitting;

namespace CloudStruct.Stages.Faces;

/// <summary>Takes weathered ground out of labels that hold sound rock beside it.</summary>
/// <remarks>A worn bench often lies in one plane with the joint beside it. As a whole such a face would be refused with its
/// sound half, or reported with its worn one.</remarks>
internal sealed class Parting
{
    // Means over a circle of about five spacings hold some ten independent errors; with three passes one place in twenty on
    // sound rock would look worn.
    private const double Limit = 2.2;
    private const int Smoothings = 8;

    private readonly Surface surface;
    private readonly double scatterM;

    public Parting(Surface surface, double scatterM)
    {
        this.surface = surface;
        this.scatterM = scatterM;
    }

    /// <summary>Takes the label from worn parts; what is left in pieces gets a label for each.</summary>
    /// <param name="pieces">Labels, sorted, with planes.</param>
    /// <param name="usualSpread">Usual rms sine between local normals and plane of the scene.</param>
    public void Into(Pieces pieces, double usualSpread)
    {
        if (!(usualSpread > 0)) return;
        bool[] worn = Worn(pieces, usualSpread);
        Parts(pieces, worn);
        pieces.Compact(surface.SmallestPoints, surface.Threads);
        pieces.Refit(surface, scatterM, 3);
    }

    private bool[] Worn(Pieces pieces, double usualSpread)
    {
        int n = surface.Count;
        ushort[] same = Same(pieces.Label);
        Signs[] signs = new Signs[n], other = new Signs[n];
        double perTurn = 1 / (usualSpread * usualSpread), perPower = 1 / (scatterM * scatterM);
        BlockParallel.For(n, surface.Threads, surface.Stop, (from, to) =>
        {
            for (int i = from; i < to; i++)
            {
                if (pieces.Label[i] == 0) continue;
                PlaneFit plane = pieces.Planes[pieces.Label[i]];
                double c = surface.Agreement(i, plane.Normal), d = surface.Distance(i, plane);
                signs[i] = new Signs((float)((1 - (c * c)) * perTurn), (float)(d * d * perPower));
            }
        });
        for (int pass = 0; pass < Smoothings; pass++)
        {
            Smooth(signs, other, same, pieces.Label);
            (signs, other) = (other, signs);
        }

        bool[] mark = new bool[n], next = new bool[n];
        BlockParallel.For(n, surface.Threads, surface.Stop, (from, to) =>
        {
            for (int i = from; i < to; i++) mark[i] = pieces.Label[i] != 0 && Refusing.IsWorn(signs[i].Turn, signs[i].Power, Limit);
        });
        for (int pass = 0; pass < 2; pass++)
        {
            Majority(mark, next, same, pieces.Label);
            (mark, next) = (next, mark);
        }

        return mark;
    }

    // Which of the neighbours carry the label of the point, one bit each: read once, used in every pass.
    private ushort[] Same(int[] label)
    {
        var same = new ushort[label.Length];
        BlockParallel.For(label.Length, surface.Threads, surface.Stop, (from, to) =>
        {
            for (int i = from; i < to; i++)
            {
                int own = label[i], bits = 0;
                if (own == 0) continue;
                ReadOnlySpan<int> row = surface.NeighboursOf(i);
                for (int k = 0; k < row.Length && row[k] >= 0; k++) bits |= label[row[k]] == own ? 1 << k : 0;
                same[i] = (ushort)bits;
            }
        });
        return same;
    }

    // Mean over a point and its neighbours of the same label.
    private void Smooth(Signs[] values, Signs[] smooth, ushort[] same, int[] label) =>
        BlockParallel.For(values.Length, surface.Threads, surface.Stop, (from, to) =>
        {
            for (int i = from; i < to; i++)
            {
                if (label[i] == 0) continue;
                float turn = values[i].Turn, power = values[i].Power;
                ReadOnlySpan<int> row = surface.NeighboursOf(i);
                int count = 1 + BitOperations.PopCount(same[i]);
                for (uint bits = same[i]; bits != 0; bits &= bits - 1)
                {
                    ref readonly Signs near = ref values[row[BitOperations.TrailingZeroCount(bits)]];
                    turn += near.Turn;
                    power += near.Power;
                }

                smooth[i] = new Signs(turn / count, power / count);
            }
        });

    // Whether more than half of a point and its neighbours of the same label are marked.
    private void Majority(bool[] mark, bool[] next, ushort[] same, int[] label) =>
        BlockParallel.For(mark.Length, surface.Threads, surface.Stop, (from, to) =>
        {
            for (int i = from; i < to; i++)
            {
                if (label[i] == 0) continue;
                ReadOnlySpan<int> row = surface.NeighboursOf(i);
                int marked = mark[i] ? 1 : 0, count = 1 + BitOperations.PopCount(same[i]);
                for (uint bits = same[i]; bits != 0; bits &= bits - 1) marked += mark[row[BitOperations.TrailingZeroCount(bits)]] ? 1 : 0;
                next[i] = 2 * marked > count;
            }
        });

    // Worn parts smaller than the smallest face stay with what is around them.
    private void Parts(Pieces pieces, bool[] worn)
    {
        int[] label = pieces.Label;
        var seen = new bool[label.Length];
        var part = new List<int>();
        for (int s = 0; s < label.Length; s++)
        {
            if (!worn[s] || seen[s]) continue;
            Collect(s, label, worn, seen, part);
            if (part.Count >= 2 * surface.SmallestPoints) continue;
            foreach (int i in part) worn[i] = false;
        }

        var touched = new bool[pieces.Count];
        for (int i = 0; i < label.Length; i++) touched[label[i]] |= worn[i];
        Array.Clear(seen);
        var next = (int[])label.Clone();
        for (int s = 0; s < label.Length; s++)
        {
            if (label[s] == 0 || !touched[label[s]] || seen[s]) continue;
            Collect(s, label, worn, seen, part);
            foreach (int i in part) next[i] = worn[s] ? 0 : pieces.Count;
            if (!worn[s]) pieces.Planes.Add(pieces.Planes[label[s]]);
        }

        pieces.Label = next;
    }

    // The connected part of the same label and state; the list serves as the queue.
    private void Collect(int start, int[] label, bool[] worn, bool[] seen, List<int> part)
    {
        part.Clear();
        part.Add(start);
        seen[start] = true;
        for (int at = 0; at < part.Count; at++)
        {
            foreach (int j in surface.NeighboursOf(part[at]))
            {
                if (j < 0) break;
                if (seen[j] || label[j] != label[start] || worn[j] != worn[start]) continue;
                seen[j] = true;
                part.Add(j);
            }
        }
    }

    // Squared turn of the normal and squared distance from the plane, over the usual; side by side, as they are read together.
    private readonly record struct Signs(float Turn, float Power);
}
