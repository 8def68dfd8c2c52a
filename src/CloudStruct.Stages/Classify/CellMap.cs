namespace CloudStruct.Stages.Classify;

/// <summary>Cells of a cubic lattice by their three integers: open addressing, filled once, read from any thread.</summary>
internal sealed class CellMap
{
    private const int Offset = 1 << 20;   // 21 bits a coordinate
    private readonly ulong[] keys;        // 0 marks an empty place: no key is 0, for coordinates are shifted by Offset
    private readonly int[] values;
    private readonly int mask;

    public CellMap(int expected)
    {
        int size = 16;
        while (size < 2L * expected && size < 1 << 30) size *= 2;
        keys = new ulong[size];
        values = new int[size];
        mask = size - 1;
    }

    public int Count { get; private set; }

    /// <summary>Number of the cell, -1 when it is not there.</summary>
    public int Find(int x, int y, int z)
    {
        ulong key = Key(x, y, z);
        for (int i = Place(key); ; i = (i + 1) & mask)
        {
            if (keys[i] == key) return values[i];
            if (keys[i] == 0) return -1;
        }
    }

    /// <summary>Number of the cell, made anew when it is not there: numbers run in order of first mention.</summary>
    public int FindOrAdd(int x, int y, int z)
    {
        ulong key = Key(x, y, z);
        for (int i = Place(key); ; i = (i + 1) & mask)
        {
            if (keys[i] == key) return values[i];
            if (keys[i] != 0) continue;
            keys[i] = key;
            return values[i] = Count++;
        }
    }

    private static ulong Key(int x, int y, int z) => unchecked(((ulong)(uint)(x + Offset) << 42) | ((ulong)(uint)(y + Offset) << 21) | (uint)(z + Offset));

    private int Place(ulong key)
    {
        unchecked
        {
            key *= 0x9E3779B97F4A7C15UL;
            return (int)(key >> 33) & mask;
        }
    }
}
