using System.Numerics;
using CloudStruct.Maths.Blocks;

namespace CloudStruct.Maths.Neighbours;

/// <summary>Stable order of non-negative 64-bit keys by counting digits from the lowest up.</summary>
/// <remarks>Eleven bits a digit: the counts stay in the first cache. Three rounds serve a scene of 100 m at 6 cm. Key and place
/// travel together in one number wherever both fit, so that every round reads straight through.</remarks>
public static class RadixOrder
{
    private const int Bits = 11;
    private const int Buckets = 1 << Bits;
    private const int LeastPerPart = 1 << 15;

    /// <summary>Permutation that sorts the keys: keys[order[0]] ≤ keys[order[1]] ≤ ...; equal keys stay in place.</summary>
    /// <param name="keys">None below 0; left as they are.</param>
    /// <param name="threads">Workers; the order is the same with any number.</param>
    public static int[] Of(long[] keys, int threads = 1)
    {
        long largest = 0;
        foreach (long key in keys) largest = Math.Max(largest, key);
        int keyBits = BitOperations.Log2((ulong)largest) + 1, placeBits = BitOperations.Log2((uint)Math.Max(1, keys.Length)) + 1;
        if (keyBits + placeBits > 64) return Separate(keys, largest);
        ulong[] packed = new ulong[keys.Length], other = new ulong[keys.Length];
        int parts = Math.Clamp(keys.Length / LeastPerPart, 1, Math.Max(1, threads));
        ForParts(keys.Length, parts, (_, from, to) =>
        {
            for (int i = from; i < to; i++) packed[i] = ((ulong)keys[i] << placeBits) | (uint)i;
        });
        var firsts = new int[parts * Buckets];
        for (int shift = placeBits; shift < placeBits + keyBits; shift += Bits)
        {
            (ulong[] source, ulong[] target, int at) = (packed, other, shift);
            Array.Clear(firsts);
            ForParts(keys.Length, parts, (part, from, to) =>
            {
                Span<int> count = firsts.AsSpan(part * Buckets, Buckets);
                for (int i = from; i < to; i++) count[(int)((source[i] >> at) & (Buckets - 1))]++;
            });
            int sum = 0;
            for (int b = 0; b < Buckets; b++)
            {
                for (int part = 0; part < parts; part++)
                {
                    ref int first = ref firsts[(part * Buckets) + b];
                    (first, sum) = (sum, sum + first);
                }
            }

            ForParts(keys.Length, parts, (part, from, to) =>
            {
                Span<int> next = firsts.AsSpan(part * Buckets, Buckets);
                for (int i = from; i < to; i++)
                {
                    ulong key = source[i];
                    target[next[(int)((key >> at) & (Buckets - 1))]++] = key;
                }
            });
            (packed, other) = (other, packed);
        }

        var order = new int[keys.Length];
        ulong mask = (1UL << placeBits) - 1;
        ForParts(keys.Length, parts, (_, from, to) =>
        {
            for (int i = from; i < to; i++) order[i] = (int)(packed[i] & mask);
        });
        return order;
    }

    // Keys too long to carry their place: cells of a millimetre over kilometres.
    private static int[] Separate(long[] keys, long largest)
    {
        var order = new int[keys.Length];
        for (int i = 0; i < order.Length; i++) order[i] = i;
        var other = new int[keys.Length];
        var first = new int[Buckets];
        for (int shift = 0; shift < 63 && (largest >> shift) != 0; shift += Bits)
        {
            Array.Clear(first);
            foreach (long key in keys) first[(int)((key >> shift) & (Buckets - 1))]++;
            int sum = 0;
            for (int b = 0; b < Buckets; b++)
            {
                (first[b], sum) = (sum, sum + first[b]);
            }

            foreach (int i in order) other[first[(int)((keys[i] >> shift) & (Buckets - 1))]++] = i;
            (order, other) = (other, order);
        }

        return order;
    }

    private static void ForParts(int count, int parts, Action<int, int, int> body) =>
        BlockParallel.For(parts, parts, CancellationToken.None, (from, to) =>
        {
            for (int part = from; part < to; part++) body(part, (int)((long)count * part / parts), (int)((long)count * (part + 1) / parts));
        }, 1);
}
