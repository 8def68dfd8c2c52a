using System.Runtime.CompilerServices;
using CloudStruct.Maths.Blocks;

namespace CloudStruct.Stages.Classify;

/// <summary>Patches in the coordinates of a sheet's reference plane, sorted by s and then by number: made once for all corridors
/// along the same sheet, however its margins move.</summary>
internal sealed class StrikeOrder
{
    private const int Bits = 11, NumberBits = 30;

    private StrikeOrder(int[] patch, double[] s, double[] v, double[] t) => (Patch, S, V, T) = (patch, s, v, t);

    public int[] Patch { get; }
    public double[] S { get; }
    public double[] V { get; }
    public double[] T { get; }

    /// <summary>Sorts the patches that take part.</summary>
    /// <param name="patches">All patches.</param>
    /// <param name="sheet">The sheet whose plane it is.</param>
    /// <param name="reachM">Farthest |s| [m].</param>
    /// <param name="rock">Patches that are rock.</param>
    /// <param name="taken">Patches that a dike has taken.</param>
    /// <param name="threads">Workers.</param>
    /// <param name="stop">Stop.</param>
    public static StrikeOrder Of(Patches patches, Sheet sheet, double reachM, bool[] rock, bool[] taken, int threads, CancellationToken stop)
    {
        (int[] Patch, double[] S, double[] V, double[] T, int Count)[] parts = BlockParallel.Map(patches.Count, threads, stop, (from, to) =>
        {
            var own = (Patch: new int[to - from], S: new double[to - from], V: new double[to - from], T: new double[to - from], Count: 0);
            unchecked
            {
                for (int i = from; i < to; i++)
                {
                    if (!rock[i] || taken[i]) continue;
                    (double s, double v, double t) = sheet.At(patches.X[i], patches.Y[i], patches.Z[i]);
                    if (Math.Abs(s) > reachM) continue;
                    (own.Patch[own.Count], own.S[own.Count], own.V[own.Count], own.T[own.Count]) = (i, s, v, t);
                    own.Count++;
                }
            }

            return own;
        });
        int n = 0;
        foreach (var part in parts) n += part.Count;
        var place = new int[n];
        double[] sums = new double[n], vs = new double[n], ts = new double[n];
        int at = 0;
        foreach ((int[] patch, double[] s, double[] v, double[] t, int count) in parts)
        {
            Array.Copy(patch, 0, place, at, count);
            Array.Copy(s, 0, sums, at, count);
            Array.Copy(v, 0, vs, at, count);
            Array.Copy(t, 0, ts, at, count);
            at += count;
        }

        int[] order = Rising(sums);
        return new StrikeOrder(Picked(place, order), Picked(sums, order), Picked(vs, order), Picked(ts, order));
    }

    /// <summary>Order of rising values, equal ones as they came: by 33 bits of their place between the ends, then the few that
    /// these do not part by comparing.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    internal static int[] Rising(double[] values)
    {
        int n = values.Length;
        var order = new int[n];
        if (n == 0) return order;
        unchecked
        {
            double low = values[0], high = values[0];
            foreach (double v in values) (low, high) = (Math.Min(low, v), Math.Max(high, v));
            double scale = high > low ? ((1L << (3 * Bits)) - 1) / (high - low) : 0;
            // Place and number travel together: following the numbers would wait for memory at every step.
            ulong[] keys = new ulong[n], other = new ulong[n];
            var starts = new int[3 << Bits];
            const int Mask = (1 << Bits) - 1;
            for (int i = 0; i < n; i++)
            {
                ulong place = (ulong)((values[i] - low) * scale);
                keys[i] = (place << NumberBits) | (uint)i;
                for (int p = 0; p < 3; p++) starts[(p << Bits) + ((int)(place >> (p * Bits)) & Mask)]++;
            }

            for (int p = 0; p < 3; p++)
            {
                Span<int> at = starts.AsSpan(p << Bits, 1 << Bits);
                int sum = 0;
                for (int b = 0; b < at.Length; b++) (at[b], sum) = (sum, sum + at[b]);
                foreach (ulong key in keys) other[at[(int)(key >> (NumberBits + (p * Bits))) & Mask]++] = key;
                (keys, other) = (other, keys);
            }

            for (int i = 0; i < n; i++) order[i] = (int)(keys[i] & ((1u << NumberBits) - 1));
            for (int k = 1; k < n; k++)
            {
                int here = order[k], j = k;
                while (j > 0 && values[order[j - 1]] > values[here])
                {
                    order[j] = order[j - 1];
                    j--;
                }

                order[j] = here;
            }
        }

        return order;
    }

    private static T[] Picked<T>(T[] values, int[] order)
    {
        var picked = new T[order.Length];
        for (int i = 0; i < picked.Length; i++) picked[i] = values[order[i]];
        return picked;
    }
}
