using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace CloudStruct.Maths.Fitting;

/// <content>Sums over pairs of cells by distance.</content>
public sealed partial class PatchModes
{
    // Cells nearer than this many steps take the spread of distances between their points, farther ones the middle distance.
    private const int NearSteps = 2;
    private const int SubSteps = 4;

    // Lanes are waves, so that the order of summation is the same on every machine.
    private double[] SumPairs(int waves, double total)
    {
        int cells = nx * ny;
        for (int c = 0; c < cells; c++)
        {
            for (int k = 0; k < waves; k++) wave[(c * PatchRecord.Lanes) + k] *= weight[c];
        }

        var sums = new double[bins.Count * PatchRecord.Lanes];
        Span<double> at = stackalloc double[PatchRecord.Lanes];
        for (int dy = 0; dy < ny; dy++)
        {
            for (int dx = dy == 0 ? 0 : 1 - nx; dx < nx; dx++)
            {
                double cross = SumOffset(dx, dy, at);
                double times = dx == 0 && dy == 0 ? 1 : 2;   // each pair once, counted both ways
                at[PatchRecord.CrossLane] = cross;
                for (int k = 0; k < at.Length; k++) at[k] *= times / (total * total);
                Spread(Math.Abs(dx), dy, at, sums);
            }
        }

        return sums;
    }

    // Six vectors of sums stay in registers; cells without points hold zeros there and are passed over by runs.
    private double SumOffset(int dx, int dy, Span<double> at)
    {
        Vector256<double> s0 = default, s1 = default, s2 = default, s3 = default, s4 = default, s5 = default;
        double cross = 0;
        ref double all = ref MemoryMarshal.GetArrayDataReference(wave);
        int fromX = Math.Max(0, -dx), toX = Math.Min(nx, nx - dx);
        for (int y = 0; y + dy < ny; y++)
        {
            int row = y * nx, other = ((y + dy) * nx) + dx;
            ReadOnlySpan<double> own = weight.AsSpan(row + fromX, toX - fromX), near = weight.AsSpan(other + fromX, toX - fromX);
            for (int x = 0; x < own.Length; x++)
            {
                if (own[x] == 0 || near[x] == 0) continue;
                ref double a = ref Unsafe.Add(ref all, (nint)(row + fromX + x) * PatchRecord.Lanes);
                ref double b = ref Unsafe.Add(ref all, (nint)(other + fromX + x) * PatchRecord.Lanes);
                s0 += Vector256.LoadUnsafe(ref a) * Vector256.LoadUnsafe(ref b);
                s1 += Vector256.LoadUnsafe(ref a, 4) * Vector256.LoadUnsafe(ref b, 4);
                s2 += Vector256.LoadUnsafe(ref a, 8) * Vector256.LoadUnsafe(ref b, 8);
                s3 += Vector256.LoadUnsafe(ref a, 12) * Vector256.LoadUnsafe(ref b, 12);
                s4 += Vector256.LoadUnsafe(ref a, 16) * Vector256.LoadUnsafe(ref b, 16);
                s5 += Vector256.LoadUnsafe(ref a, 20) * Vector256.LoadUnsafe(ref b, 20);
                cross += ((Unsafe.Add(ref a, 1) * Unsafe.Add(ref b, 2)) + (Unsafe.Add(ref a, 2) * Unsafe.Add(ref b, 1))) / 2;
            }
        }

        s0.CopyTo(at);
        s1.CopyTo(at[4..]);
        s2.CopyTo(at[8..]);
        s3.CopyTo(at[12..]);
        s4.CopyTo(at[16..]);
        s5.CopyTo(at[20..]);
        return cross;
    }

    private void Spread(int dx, int dy, ReadOnlySpan<double> values, double[] sums)
    {
        if (dx > NearSteps || dy > NearSteps)
        {
            Put(cellM * Math.Sqrt((dx * dx) + (dy * dy)), 1, values, sums);
            return;
        }

        // Differences of two places drawn evenly from two cells have a triangular law on each axis.
        for (int i = 1 - SubSteps; i < SubSteps; i++)
        {
            for (int j = 1 - SubSteps; j < SubSteps; j++)
            {
                double x = dx + ((double)i / SubSteps), y = dy + ((double)j / SubSteps);
                double share = (double)((SubSteps - Math.Abs(i)) * (SubSteps - Math.Abs(j))) / (SubSteps * SubSteps * SubSteps * SubSteps);
                Put(cellM * Math.Sqrt((x * x) + (y * y)), share, values, sums);
            }
        }
    }

    private void Put(double distanceM, double share, ReadOnlySpan<double> values, double[] sums)
    {
        (int bin, double upper) = bins.Place(distanceM);
        int low = bin * values.Length, high = low + values.Length;
        for (int k = 0; k < values.Length; k++)
        {
            sums[low + k] += share * (1 - upper) * values[k];
            sums[high + k] += share * upper * values[k];
        }
    }
}
