namespace CloudStruct.Simulate.Rock;

/// <summary>Where a ray crosses margins, kept in order of distance; reused from ray to ray.</summary>
internal sealed class CrossingList
{
    private const int Most = 32;
    private readonly (double T, int Dike, int Side)[] items = new (double, int, int)[Most];

    /// <summary>Crossings held.</summary>
    public int Count { get; private set; }

    /// <summary>A crossing: distance along the ray, dike number, side (0 A, 1 B).</summary>
    public (double T, int Dike, int Side) this[int i] => items[i];

    /// <summary>Forgets all.</summary>
    public void Clear() => Count = 0;

    /// <summary>Adds a crossing at its place.</summary>
    public void Add(double t, int dike, int side)
    {
        if (Count == Most) return;   // a ray along a wavy margin: what lies behind 32 crossings is never the first hit
        int k = Count++;
        for (; k > 0 && items[k - 1].T > t; k--) items[k] = items[k - 1];
        items[k] = (t, dike, side);
    }
}
