namespace CloudStruct.Stages.Classify;

/// <summary>Cells of a cubic lattice by their three integers: open addressing, filled by one thread, read from any; grows when more cells come than expected.</summary>
internal sealed class CellMap
{
    private const int Offset = 1 << 20;   // 21 bits a coordinate
    private ulong[] keys;        // 0 marks an empty place: no key is 0, for coordinates are shifted by Offset
    private int[] values;
    private int mask;

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
            // A full table would be searched for ever.
            if (4L * Count >= 3L * keys.Length)
            {
                Grow();
                return FindOrAdd(x, y, z);
            }

            keys[i] = key;
            return values[i] = Count++;
        }
    }

    private void Grow()
    {
        (ulong[] oldKeys, int[] oldValues) = (keys, values);
        keys = new ulong[2 * oldKeys.Length];
        values = new int[keys.Length];
        mask = keys.Length - 1;
        for (int k = 0; k < oldKeys.Length; k++)
        {
            if (oldKeys[k] == 0) continue;
            int i = Place(oldKeys[k]);
            while (keys[i] != 0) i = (i + 1) & mask;
            (keys[i], values[i]) = (oldKeys[k], oldValues[k]);
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
