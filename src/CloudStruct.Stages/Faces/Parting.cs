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
        pieces.Compact(surface.SmallestPoints);
        pieces.Refit(surface, scatterM, 3);
    }

    private bool[] Worn(Pieces pieces, double usualSpread)
    {
        int n = surface.Count;
        float[] turn = new float[n], power = new float[n];
        double perTurn = 1 / (usualSpread * usualSpread), perPower = 1 / (scatterM * scatterM);
        BlockParallel.For(n, surface.Threads, surface.Stop, (from, to) =>
        {
            for (int i = from; i < to; i++)
            {
                if (pieces.Label[i] == 0) continue;
                PlaneFit plane = pieces.Planes[pieces.Label[i]];
                double c = surface.Agreement(i, plane.Normal), d = surface.Distance(i, plane);
                (turn[i], power[i]) = ((float)((1 - (c * c)) * perTurn), (float)(d * d * perPower));
            }
        });
        for (int pass = 0; pass < Smoothings; pass++)
        {
            turn = Smooth(turn, pieces.Label);
            power = Smooth(power, pieces.Label);
        }

        var mark = new float[n];
        for (int i = 0; i < n; i++) mark[i] = pieces.Label[i] != 0 && Refusing.IsWorn(turn[i], power[i], Limit) ? 1 : 0;
        for (int pass = 0; pass < 2; pass++) mark = Array.ConvertAll(Smooth(mark, pieces.Label), m => m > 0.5f ? 1f : 0f);
        return Array.ConvertAll(mark, m => m > 0.5f);
    }

    // Mean over a point and its neighbours of the same label.
    private float[] Smooth(float[] values, int[] label)
    {
        var smooth = new float[values.Length];
        BlockParallel.For(values.Length, surface.Threads, surface.Stop, (from, to) =>
        {
            for (int i = from; i < to; i++)
            {
                if (label[i] == 0) continue;
                float sum = values[i];
                int count = 1;
                foreach (int j in surface.NeighboursOf(i))
                {
                    if (j < 0) break;
                    if (label[j] != label[i]) continue;
                    sum += values[j];
                    count++;
                }

                smooth[i] = sum / count;
            }
        });
        return smooth;
    }

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
}
