namespace CloudStruct.Maths.Mixtures;

/// <summary>Largest flow and smallest cut of a graph with two terminals, by two search trees that are kept between augmentations.</summary>
/// <remarks>Boykov and Kolmogorov 2004, An experimental comparison of min-cut/max-flow algorithms for energy minimization in
/// vision, IEEE PAMI 26, 1124-1137. Written for sparse graphs of neighbouring points; runs on one thread and in a fixed
/// order, so the same graph gives the same cut. Nodes that neither terminal reaches count as on the sink's side.</remarks>
public sealed partial class MaxFlow
{
    private const int None = -1, Terminal = -2, Orphan = -3;

    // Arcs come in pairs: arc a runs to head[a], its twin a ^ 1 runs back.
    private readonly int[] first;
    private readonly float[] terminal;   // residual: above 0 from the source, below 0 to the sink
    private int[] head, next;
    private float[] residual;
    private int arcs;
    private double flow;

    /// <summary>A graph without edges.</summary>
    /// <param name="nodes">Nodes besides the terminals.</param>
    /// <param name="edges">Edges expected; grows when more come.</param>
    public MaxFlow(int nodes, int edges)
    {
        Nodes = nodes;
        first = new int[nodes];
        Array.Fill(first, None);
        terminal = new float[nodes];
        head = new int[Math.Max(2, 2 * edges)];
        next = new int[head.Length];
        residual = new float[head.Length];
    }

    /// <summary>Nodes besides the terminals.</summary>
    public int Nodes { get; }

    /// <summary>Adds capacities of the arcs source to node and node to sink.</summary>
    /// <param name="node">Node.</param>
    /// <param name="fromSource">At least 0; paid when the node ends on the sink's side.</param>
    /// <param name="toSink">At least 0; paid when the node ends on the source's side.</param>
    public void AddTerminal(int node, double fromSource, double toSink)
    {
        // Only the difference has to be sent through the graph; the common part flows at once.
        double have = terminal[node];
        if (have > 0) fromSource += have;
        else toSink -= have;
        flow += Math.Min(fromSource, toSink);
        terminal[node] = (float)(fromSource - toSink);
    }

    /// <summary>Adds an edge with a capacity in each direction.</summary>
    /// <param name="a">One end.</param>
    /// <param name="b">Other end, not a.</param>
    /// <param name="ab">At least 0; paid when a is on the source's side and b on the sink's.</param>
    /// <param name="ba">At least 0; paid the other way round.</param>
    public void AddEdge(int a, int b, double ab, double ba)
    {
        if (arcs + 2 > head.Length)
        {
            int size = head.Length * 2;
            Array.Resize(ref head, size);
            Array.Resize(ref next, size);
            Array.Resize(ref residual, size);
        }

        head[arcs] = b;
        next[arcs] = first[a];
        residual[arcs] = (float)ab;
        first[a] = arcs++;
        head[arcs] = a;
        next[arcs] = first[b];
        residual[arcs] = (float)ba;
        first[b] = arcs++;
    }

    /// <summary>True when the smallest cut leaves the node with the source; ask after <see cref="Solve"/>.</summary>
    public bool WithSource(int node) => parent[node] != None && !inSinkTree[node];
}
