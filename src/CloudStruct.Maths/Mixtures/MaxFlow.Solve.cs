using System.Runtime.CompilerServices;

namespace CloudStruct.Maths.Mixtures;

/// <summary>The search: grow both trees until they touch, augment, adopt the orphans.</summary>
public sealed partial class MaxFlow
{
    private int[] parent = [];          // arc from the node to its parent
    private bool[] inSinkTree = [];
    private int[] stamp = [], depth = [];
    private int now;
    private int[] queueNext = [];       // queue of active nodes as a linked list; a node that is last points to itself
    private int queueFirst, queueLast;
    private readonly Queue<int> orphans = new();

    /// <summary>Sends the largest flow; to be called once, when the graph is complete.</summary>
    /// <returns>Value of the flow, which is the cost of the smallest cut.</returns>
    public double Solve()
    {
        parent = new int[Nodes];
        inSinkTree = new bool[Nodes];
        stamp = new int[Nodes];
        depth = new int[Nodes];
        queueNext = new int[Nodes];
        Array.Fill(parent, None);
        Array.Fill(queueNext, None);
        queueFirst = queueLast = None;
        for (int i = 0; i < Nodes; i++)
        {
            if (terminal[i] == 0) continue;
            parent[i] = Terminal;
            inSinkTree[i] = terminal[i] < 0;
            depth[i] = 1;
            Activate(i);
        }

        int current = None;
        while (true)
        {
            int node = current != None && parent[current] != None ? current : NextActive();
            if (node == None) break;
            int bridge = Grow(node);
            now++;
            if (bridge == None)
            {
                current = None;
                continue;
            }

            current = node;   // it may touch the other tree again: stay with it
            Augment(bridge);
            while (orphans.Count > 0) Adopt(orphans.Dequeue());
        }

        return flow;
    }

    private void Activate(int i)
    {
        if (queueNext[i] != None) return;
        if (queueLast != None) queueNext[queueLast] = i;
        else queueFirst = i;
        queueLast = i;
        queueNext[i] = i;
    }

    private int NextActive()
    {
        while (queueFirst != None)
        {
            int i = queueFirst;
            if (queueNext[i] == i) queueFirst = queueLast = None;
            else queueFirst = queueNext[i];
            queueNext[i] = None;
            if (parent[i] != None) return i;
        }

        return None;
    }

    /// <summary>Extends the tree of a node over its unsaturated arcs; returns the arc from the source's to the sink's tree where they touch.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private int Grow(int i)
    {
        bool sink = inSinkTree[i];
        for (int a = first[i]; a != None; a = next[a])
        {
            if (residual[sink ? a ^ 1 : a] == 0) continue;
            int j = head[a];
            if (parent[j] == None)
            {
                inSinkTree[j] = sink;
                parent[j] = a ^ 1;
                stamp[j] = stamp[i];
                depth[j] = depth[i] + 1;
                Activate(j);
            }
            else if (inSinkTree[j] != sink)
            {
                return sink ? a ^ 1 : a;
            }
            else if (stamp[j] <= stamp[i] && depth[j] > depth[i])
            {
                // A shorter way to the terminal keeps the trees flat.
                parent[j] = a ^ 1;
                stamp[j] = stamp[i];
                depth[j] = depth[i] + 1;
            }
        }

        return None;
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private void Augment(int bridge)
    {
        float least = residual[bridge];
        int from = head[bridge ^ 1], to = head[bridge], i;
        for (i = from; parent[i] != Terminal; i = head[parent[i]]) least = Math.Min(least, residual[parent[i] ^ 1]);
        least = Math.Min(least, terminal[i]);
        for (i = to; parent[i] != Terminal; i = head[parent[i]]) least = Math.Min(least, residual[parent[i]]);
        least = Math.Min(least, -terminal[i]);

        residual[bridge] -= least;
        residual[bridge ^ 1] += least;
        for (i = from; parent[i] != Terminal;)
        {
            int up = parent[i];
            residual[up] += least;
            residual[up ^ 1] -= least;
            int above = head[up];
            if (residual[up ^ 1] == 0) SetOrphan(i);
            i = above;
        }

        terminal[i] -= least;
        if (terminal[i] == 0) SetOrphan(i);
        for (i = to; parent[i] != Terminal;)
        {
            int up = parent[i];
            residual[up ^ 1] += least;
            residual[up] -= least;
            int above = head[up];
            if (residual[up] == 0) SetOrphan(i);
            i = above;
        }

        terminal[i] += least;
        if (terminal[i] == 0) SetOrphan(i);
        flow += least;
    }

    private void SetOrphan(int i)
    {
        parent[i] = Orphan;
        orphans.Enqueue(i);
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private void Adopt(int i)
    {
        bool sink = inSinkTree[i];
        int best = None, bestDepth = int.MaxValue;
        for (int a = first[i]; a != None; a = next[a])
        {
            int j = head[a];
            if (residual[sink ? a : a ^ 1] == 0 || inSinkTree[j] != sink || parent[j] == None) continue;
            int d = DepthOf(j);
            if (d >= bestDepth) continue;
            best = a;
            bestDepth = d;
        }

        if (best != None)
        {
            parent[i] = best;
            stamp[i] = now;
            depth[i] = bestDepth + 1;
            return;
        }

        // No parent left: the node goes free, its children become orphans, its neighbours may reach it anew.
        stamp[i] = 0;
        for (int a = first[i]; a != None; a = next[a])
        {
            int j = head[a];
            if (parent[j] == None || inSinkTree[j] != sink) continue;
            if (residual[sink ? a : a ^ 1] != 0) Activate(j);
            if (parent[j] >= 0 && head[parent[j]] == i) SetOrphan(j);
        }

        parent[i] = None;
    }

    /// <summary>Steps from a node to its terminal; the largest integer when its tree has been cut. Stamps the way for the next to ask.</summary>
    private int DepthOf(int j)
    {
        int d = 0, k = j;
        while (true)
        {
            if (stamp[k] == now)
            {
                d += depth[k];
                break;
            }

            int up = parent[k];
            d++;
            if (up == Terminal)
            {
                stamp[k] = now;
                depth[k] = 1;
                break;
            }

            if (up is Orphan or None) return int.MaxValue;
            k = head[up];
        }

        for (k = j; stamp[k] != now; k = head[parent[k]])
        {
            stamp[k] = now;
            depth[k] = d--;
        }

        return depth[j];
    }
}
