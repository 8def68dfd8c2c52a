using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace CloudStruct.Stages.Classify;

/// <summary>The cells of one window and their sums in bins along a pole: the memory of one worker of the search.</summary>
/// <remarks>Sums along the bins are cumulative, so that any slab and its flanks cost three differences. Half of the search went into
/// checked conversions of single cells to bins; eight at a time, unchecked, they cost a fifth.</remarks>
internal sealed class SlabBins
{
    private const int Bins = SlabSearch.Bins, Lanes = SlabSearch.Lanes;

    private readonly Vector256<float>[] first = new Vector256<float>[Bins + 1], second = new Vector256<float>[Bins + 1];
    private readonly float[] weight = new float[Bins + 1];
    private int[] bin = [];

    /// <summary>Weighted columns (packed: and their weighted squares in the upper half) per cell.</summary>
    public Vector256<float>[] First { get; private set; } = [];

    /// <summary>Weighted squares per cell, when they are not packed.</summary>
    public Vector256<float>[] Second { get; private set; } = [];

    /// <summary>Weight per cell.</summary>
    public float[] Weight { get; private set; } = [];

    /// <summary>Places of the cells about the middle of the window [m].</summary>
    public float[] X { get; private set; } = [];

    public float[] Y { get; private set; } = [];

    public float[] Z { get; private set; } = [];

    /// <summary>Makes room for a window.</summary>
    public void Hold(int n)
    {
        if (First.Length >= n) return;
        int room = (n + 7) & ~7;
        (First, Second) = (new Vector256<float>[room], new Vector256<float>[room]);
        (X, Y, Z, Weight, bin) = (new float[room], new float[room], new float[room], new float[room], new int[room]);
    }

    /// <summary>Sums the cells along a pole, given in bins per metre.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public void Bin(float nx, float ny, float nz, int n, bool packed)
    {
        unchecked
        {
            Span<Vector256<float>> x = MemoryMarshal.Cast<float, Vector256<float>>(X.AsSpan()), y = MemoryMarshal.Cast<float, Vector256<float>>(Y.AsSpan()), z = MemoryMarshal.Cast<float, Vector256<float>>(Z.AsSpan());
            Span<Vector256<int>> at = MemoryMarshal.Cast<int, Vector256<int>>(bin.AsSpan());
            Vector256<int> one = Vector256.Create(1), last = Vector256.Create(Bins);
            for (int k = 0; k < (n + 7) / 8; k++)
            {
                Vector256<float> along = (x[k] * nx) + (y[k] * ny) + (z[k] * nz) + Vector256.Create((float)SlabSearch.WindowCells);
                at[k] = Vector256.Min(Vector256.Max(Vector256.ConvertToInt32(along) + one, one), last);
            }

            Array.Clear(first);
            Span<Vector256<float>> one1 = First, sums = first;
            if (packed)
            {
                for (int k = 0; k < n; k++) sums[bin[k]] += one1[k];
            }
            else
            {
                Array.Clear(second);
                Span<Vector256<float>> two = Second, squares = second;
                for (int k = 0; k < n; k++)
                {
                    int b = bin[k];
                    sums[b] += one1[k];
                    squares[b] += two[k];
                }

                for (int b = 1; b <= Bins; b++) squares[b] += squares[b - 1];
            }

            for (int b = 1; b <= Bins; b++)
            {
                sums[b] += sums[b - 1];
                weight[b] = sums[b][packed ? SlabSearch.Packed - 1 : Lanes - 1];
            }
        }
    }

    /// <summary>Weights inside and on the flanks; false when too little of either is seen.</summary>
    public bool Weighs(int from, int width, out float wi, out float wa, out float wb)
    {
        unchecked
        {
            int to = from + width, low = Math.Max(0, from - width), high = Math.Min(Bins, to + width);
            wi = weight[to] - weight[from];
            wa = weight[from] - weight[low];
            wb = weight[high] - weight[to];
            return !(wi < 30 || wa < 0.35f * wi || wb < 0.35f * wi);
        }
    }

    /// <summary>Contrast of a slab with both flanks, all lanes.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public double Contrast(int from, int width, float wi, float wa, float wb, bool colour)
    {
        unchecked
        {
            int to = from + width, low = Math.Max(0, from - width), high = Math.Min(Bins, to + width);
            Vector256<float> inside = first[to] - first[from], a = first[from] - first[low], b = first[high] - first[to];
            Vector256<float> mi = inside / wi, ma = a / wa, mb = b / wb;
            Vector256<float> variance = ((second[high] - second[low]) - (mi * inside) - (ma * a) - (mb * b)) / (wi + wa + wb);
            Vector256<float> ratio = (mi - ma) * (mi - mb) / (Vector256.Max(variance, Vector256<float>.Zero) + Vector256.Create(0.03f));
            double contrast = Vector256.Sum(ratio.WithElement(Lanes - 1, 0));
            // A wall or a bench differs from its flanks by slope first: what slope tells speaks against a slab.
            return colour ? contrast : contrast - (3 * Math.Max(0, ratio[0]));
        }
    }

    /// <summary>The same for colour, whose three columns and squares share a vector.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public double PackedContrast(int from, int width, float wi, float wa, float wb)
    {
        unchecked
        {
            int to = from + width, low = Math.Max(0, from - width), high = Math.Min(Bins, to + width);
            Vector256<float> f = first[from], t = first[to], l = first[low], h = first[high];
            Vector128<float> inside = t.GetLower() - f.GetLower(), a = f.GetLower() - l.GetLower(), b = h.GetLower() - t.GetLower();
            Vector128<float> mi = inside / wi, ma = a / wa, mb = b / wb;
            Vector128<float> variance = ((h.GetUpper() - l.GetUpper()) - (mi * inside) - (ma * a) - (mb * b)) / (wi + wa + wb);
            Vector128<float> ratio = (mi - ma) * (mi - mb) / (Vector128.Max(variance, Vector128<float>.Zero) + Vector128.Create(0.03f));
            return Vector128.Sum(ratio.WithElement(SlabSearch.Packed - 1, 0));
        }
    }
}
