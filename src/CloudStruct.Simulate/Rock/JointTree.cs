using CloudStruct.Records.Frame;

namespace CloudStruct.Simulate.Rock;

/// <summary>A rock mass cut into blocks by joint planes, younger joints ending at older ones.</summary>
/// <remarks>A binary tree of planes (leaves are blocks): each plane is a true plane, scattered about the mean of its set,
/// and ends at the planes above it in the tree, as joints abut on older joints. A block is there or broken away.</remarks>
internal sealed class JointTree
{
    /// <summary>Cuts halve pieces more or less: a million blocks lie about 30 deep. Deeper trees fail loudly.</summary>
    private const int MostDepth = 96;

    private readonly Node[] nodes;
    private readonly Block[] blocks;
    private readonly State[] states;

    /// <summary>A tree from its parts; node 0 is the root; a child below 0 is the block ~child.</summary>
    public JointTree(Node[] nodes, Block[] blocks)
    {
        this.nodes = nodes;
        this.blocks = blocks;
        states = new State[nodes.Length];
        for (int i = nodes.Length - 1; i >= 0; i--)   // children come after their parents
        {
            State below = StateOf(nodes[i].Below), above = StateOf(nodes[i].Above);
            states[i] = below == above ? below : State.Mixed;
        }
    }

    private enum State : byte
    {
        Mixed,
        Empty,
        Full,
    }

    /// <summary>Planes.</summary>
    public int PlaneCount => nodes.Length;

    /// <summary>Blocks.</summary>
    public int BlockCount => blocks.Length;

    /// <summary>Node 0, or the only block of a rock without joints.</summary>
    private int Root => nodes.Length == 0 ? ~0 : 0;

    /// <summary>Plane of a node: unit normal and offset (normal · place = offset).</summary>
    public (Vec3 Normal, double Offset) Plane(int node) => (new(nodes[node].X, nodes[node].Y, nodes[node].Z), nodes[node].Offset);

    /// <summary>The joint set a plane belongs to.</summary>
    public int SetOf(int node) => nodes[node].Set;

    /// <summary>A block.</summary>
    public Block BlockOf(int block) => blocks[block];

    /// <summary>The block that holds a place.</summary>
    public int Find(Vec3 p)
    {
        int node = Root;
        while (node >= 0)
        {
            ref readonly Node n = ref nodes[node];
            node = (n.X * p.X) + (n.Y * p.Y) + (n.Z * p.Z) > n.Offset ? n.Above : n.Below;
        }

        return ~node;
    }

    /// <summary>Whether the block at a place is there.</summary>
    public bool Solid(Vec3 p) => blocks[Find(p)].Present;

    /// <summary>Planes that bound the block at a place, nearest to the leaf last: nodes into a caller's buffer.</summary>
    public int Path(Vec3 p, Span<int> path)
    {
        int count = 0, node = Root;
        while (node >= 0 && count < path.Length)
        {
            path[count++] = node;
            ref readonly Node n = ref nodes[node];
            node = (n.X * p.X) + (n.Y * p.Y) + (n.Z * p.Z) > n.Offset ? n.Above : n.Below;
        }

        return count;
    }

    /// <summary>How many planes of a set lie between the blocks along a line.</summary>
    public int CountCrossings(Vec3 from, Vec3 to, int set) => CountCrossings(Root, from, to, set);

    /// <summary>First place along a ray where a block is there.</summary>
    /// <param name="from">Start, local.</param>
    /// <param name="toward">Unit direction.</param>
    /// <param name="start">Where the search starts along the ray.</param>
    /// <param name="end">Where it ends.</param>
    /// <param name="t">[out] Place along the ray.</param>
    /// <param name="node">[out] Plane through which the block was entered; -1 when the ray started in it.</param>
    public bool Cast(Vec3 from, Vec3 toward, double start, double end, out double t, out int node)
    {
        Span<Pending> stack = stackalloc Pending[MostDepth];
        int depth = 0;
        int at = Root, entry = -1;
        double a = start, b = end;
        while (true)
        {
            State state = StateOf(at);
            if (state == State.Full)
            {
                (t, node) = (a, entry);
                return true;
            }

            if (state == State.Mixed)
            {
                ref readonly Node n = ref nodes[at];
                double side = (n.X * from.X) + (n.Y * from.Y) + (n.Z * from.Z) - n.Offset;
                double speed = (n.X * toward.X) + (n.Y * toward.Y) + (n.Z * toward.Z);
                bool above = side + (speed * a) > 0;
                double cross = -side / speed;   // infinite or NaN for a ray along the plane: then no crossing
                if (cross > a && cross < b)
                {
                    stack[depth++] = new(above ? n.Below : n.Above, at, cross, b);
                    b = cross;
                }

                at = above ? n.Above : n.Below;
                continue;
            }

            if (depth == 0)
            {
                (t, node) = (end, -1);
                return false;
            }

            (at, entry, a, b) = stack[--depth];
        }
    }

    private int CountCrossings(int node, Vec3 from, Vec3 to, int set)
    {
        if (node < 0) return 0;
        ref readonly Node n = ref nodes[node];
        double a = (n.X * from.X) + (n.Y * from.Y) + (n.Z * from.Z) - n.Offset, b = (n.X * to.X) + (n.Y * to.Y) + (n.Z * to.Z) - n.Offset;
        if (a > 0 == b > 0) return CountCrossings(a > 0 ? n.Above : n.Below, from, to, set);
        Vec3 at = from + ((to - from) * (a / (a - b)));
        int first = a > 0 ? n.Above : n.Below, second = a > 0 ? n.Below : n.Above;
        return (n.Set == set ? 1 : 0) + CountCrossings(first, from, at, set) + CountCrossings(second, at, to, set);
    }

    private State StateOf(int child) => child >= 0 ? states[child] : blocks[~child].Present ? State.Full : State.Empty;

    /// <summary>A plane of the tree.</summary>
    internal readonly record struct Node(double X, double Y, double Z, double Offset, int Below, int Above, int Set);

    /// <summary>A block: whether it is there, its middle, a random number of its own.</summary>
    internal readonly record struct Block(Vec3 Middle, bool Present, ulong Lot);

    private readonly record struct Pending(int At, int Entry, double A, double B);
}
