namespace CloudStruct.Maths.Blocks;

/// <summary>Random numbers from (seed, purpose, item): no shared stream, so that neither order nor threads matter.</summary>
/// <remarks>SplitMix64 (Steele, Lea and Flood 2014, Fast splittable pseudorandom number generators; constants from memory),
/// started from a mix of the three keys.</remarks>
public struct Draws
{
    private ulong state;

    /// <summary>A stream of its own for one item.</summary>
    /// <param name="seed">Seed of the run.</param>
    /// <param name="purpose">A constant per use in the code.</param>
    /// <param name="item">Index of the item.</param>
    public Draws(ulong seed, ulong purpose, ulong item)
    {
        unchecked
        {
            state = Mix(Mix(Mix(seed + 0x9E3779B97F4A7C15UL) ^ purpose) + (item * 0xD1B54A32D192ED03UL));
        }
    }

    /// <summary>Next 64 random bits.</summary>
    public ulong NextBits()
    {
        unchecked
        {
            state += 0x9E3779B97F4A7C15UL;
            return Mix(state);
        }
    }

    /// <summary>Uniform, 0 ≤ u &lt; 1, 53 bits.</summary>
    public double NextUnit() => (NextBits() >> 11) * (1.0 / (1UL << 53));

    /// <summary>Uniform integer, 0 ≤ i &lt; count.</summary>
    public int NextBelow(int count) => (int)Math.Min(count - 1, Math.Floor(NextUnit() * count));

    /// <summary>Standard normal (Box and Muller).</summary>
    public double NextNormal()
    {
        double u = 1 - NextUnit(), v = NextUnit();
        return Math.Sqrt(-2 * Math.Log(u)) * Math.Cos(2 * Math.PI * v);
    }

    private static ulong Mix(ulong z)
    {
        unchecked
        {
            z = (z ^ (z >> 30)) * 0xBF58476D1CE4E5B9UL;
            z = (z ^ (z >> 27)) * 0x94D049BB133111EBUL;
            return z ^ (z >> 31);
        }
    }
}
