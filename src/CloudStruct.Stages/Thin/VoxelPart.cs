namespace CloudStruct.Stages.Thin;

/// <summary>Voxels by key: open addressing, with the voxels themselves in runs of memory that never move.</summary>
internal sealed class VoxelPart
{
    private const int RunBits = 12;
    private const int RunSize = 1 << RunBits;

    private readonly List<Voxel[]> runs = [];
    private int[] slots = new int[1 << 12];   // 1 + number of the voxel; 0 free

    /// <summary>Voxels in use.</summary>
    public int Count { get; private set; }

    /// <summary>Voxel by number, in order of first sight.</summary>
    public ref Voxel this[int number] => ref runs[number >> RunBits][number & (RunSize - 1)];

    /// <summary>Scrambles a key: multiplicative hash by the golden ratio, whose high bits depend on all of the key.</summary>
    public static uint Mix(long key) => unchecked((uint)(((ulong)key * 0x9E3779B97F4A7C15UL) >> 32));

    /// <summary>The voxel of a key, a new one if there is none.</summary>
    /// <param name="key">The key.</param>
    /// <param name="point">Number of the point in the stream, kept when the voxel is new.</param>
    public ref Voxel Find(long key, long point)
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
            return ref Find(key, point);
        }

        if ((Count & (RunSize - 1)) == 0) runs.Add(new Voxel[RunSize]);
        slots[slot] = ++Count;
        ref Voxel added = ref this[Count - 1];
        added.Key = key;
        added.First = point;
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
}
