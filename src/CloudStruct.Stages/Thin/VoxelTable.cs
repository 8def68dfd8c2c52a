using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Thin;

/// <summary>Input points gathered into cubic voxels as they stream by: one real point is kept in each, near the voxel's mean.</summary>
/// <remarks>One pass only. Against each new point the mean so far decides whether it or the held point stays, which with
/// the few points that fall into a voxel is nearly always the point nearest to the final mean. A point in the mean
/// itself would round every edge by a third of a voxel; the point nearest to the middle of the voxel would pull level
/// rock into terraces.</remarks>
internal sealed class VoxelTable
{
    private const int ChunkBits = 15;
    private const int ChunkSize = 1 << ChunkBits;
    private const int AxisBits = 21;
    private const int Half = 1 << (AxisBits - 1);

    private readonly double edgeM;
    private readonly List<Voxel[]> chunks = [];
    private int[] slots = new int[1 << 16];   // 1 + number of the voxel; 0 free

    /// <summary>An empty table.</summary>
    /// <param name="edgeM">Edge of a voxel [m].</param>
    public VoxelTable(double edgeM) => this.edgeM = edgeM;

    /// <summary>Voxels in use.</summary>
    public int Count { get; private set; }

    /// <summary>Smallest edge whose numbers still fit for a cloud that reaches this far from the local origin [m].</summary>
    public static double SmallestEdgeM(double reachM) => 1.01 * reachM / Half;

    /// <summary>Voxel by number, in order of first sight.</summary>
    public ref Voxel this[int number] => ref chunks[number >> ChunkBits][number & (ChunkSize - 1)];

    /// <summary>Takes in a block.</summary>
    public void Add(PointBlock block)
    {
        Span<float> xs = block.X, ys = block.Y, zs = block.Z;
        Span<byte> red = block.Red, green = block.Green, blue = block.Blue, cls = block.Class;
        for (int i = 0; i < block.Count; i++)
        {
            float x = xs[i], y = ys[i], z = zs[i];
            double ix = Math.Floor(x / edgeM), iy = Math.Floor(y / edgeM), iz = Math.Floor(z / edgeM);
            long key = ((((long)iz + Half) << (2 * AxisBits)) | (((long)iy + Half) << AxisBits)) | ((long)ix + Half);
            ref Voxel v = ref Find(key);
            float dx = (float)(x - (ix * edgeM)), dy = (float)(y - (iy * edgeM)), dz = (float)(z - (iz * edgeM));
            v.Take(dx, dy, dz, x, y, z);
            v.Red += red[i];
            v.Green += green[i];
            v.Blue += blue[i];
            v.Vote(cls[i]);
        }
    }

    private ref Voxel Find(long key)
    {
        int mask = slots.Length - 1;
        int slot = (int)(Mix(key) & (uint)mask);
        while (true)
        {
            int number = slots[slot] - 1;
            if (number < 0) break;
            ref Voxel v = ref this[number];
            if (v.Key == key) return ref v;
            slot = (slot + 1) & mask;
        }

        if (Count >= slots.Length / 2)
        {
            Grow();
            return ref Find(key);
        }

        if ((Count & (ChunkSize - 1)) == 0) chunks.Add(new Voxel[ChunkSize]);
        slots[slot] = ++Count;
        ref Voxel added = ref this[Count - 1];
        added.Key = key;
        return ref added;
    }

    private void Grow()
    {
        slots = new int[2 * slots.Length];
        int mask = slots.Length - 1;
        for (int number = 0; number < Count; number++)
        {
            int slot = (int)(Mix(this[number].Key) & (uint)mask);
            while (slots[slot] != 0) slot = (slot + 1) & mask;
            slots[slot] = number + 1;
        }
    }

    // Multiplicative hash by the golden ratio; the high bits depend on all of the key.
    private static uint Mix(long key) => unchecked((uint)(((ulong)key * 0x9E3779B97F4A7C15UL) >> 32));

    /// <summary>What is known of a voxel.</summary>
    internal struct Voxel
    {
        public long Key;
        public float X, Y, Z;
        public int Count;
        public uint Red, Green, Blue;
        public byte Class;
        private float sumX, sumY, sumZ, heldX, heldY, heldZ;
        private int votes;

        /// <summary>Takes a point by its offset in the voxel, and holds it when it lies nearer to the mean than the one held.</summary>
        public void Take(float dx, float dy, float dz, float x, float y, float z)
        {
            Count++;
            sumX += dx;
            sumY += dy;
            sumZ += dz;
            float mx = sumX / Count, my = sumY / Count, mz = sumZ / Count;
            if (Count > 1 && Square(dx - mx, dy - my, dz - mz) >= Square(heldX - mx, heldY - my, heldZ - mz)) return;
            (heldX, heldY, heldZ) = (dx, dy, dz);
            (X, Y, Z) = (x, y, z);
        }

        /// <summary>Majority vote in one pass (Boyer and Moore 1981): right whenever one class has more than half.</summary>
        public void Vote(byte cls)
        {
            if (votes == 0) Class = cls;
            votes += Class == cls ? 1 : -1;
        }

        private static float Square(float a, float b, float c) => (a * a) + (b * b) + (c * c);
    }
}
