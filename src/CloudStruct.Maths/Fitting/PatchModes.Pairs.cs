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

    private double SumOffset(int dx, int dy, Span<double> at)
    {
        Span<Vector256<double>> sum = stackalloc Vector256<double>[PatchRecord.Lanes / 4];
        sum.Clear();
        double cross = 0;
        ReadOnlySpan<Vector256<double>> all = MemoryMarshal.Cast<double, Vector256<double>>(wave.AsSpan(0, nx * ny * PatchRecord.Lanes));
        int fromX = Math.Max(0, -dx), toX = Math.Min(nx, nx - dx);
        for (int y = 0; y + dy < ny; y++)
        {
            for (int x = fromX; x < toX; x++)
            {
                int c = (y * nx) + x, o = ((y + dy) * nx) + x + dx;
                if (weight[c] == 0 || weight[o] == 0) continue;
                ReadOnlySpan<Vector256<double>> a = all.Slice(c * (PatchRecord.Lanes / 4), PatchRecord.Lanes / 4), b = all.Slice(o * (PatchRecord.Lanes / 4), PatchRecord.Lanes / 4);
                for (int k = 0; k < PatchRecord.Lanes / 4; k++) sum[k] += a[k] * b[k];
                cross += ((wave[(c * PatchRecord.Lanes) + 1] * wave[(o * PatchRecord.Lanes) + 2]) + (wave[(c * PatchRecord.Lanes) + 2] * wave[(o * PatchRecord.Lanes) + 1])) / 2;
            }
        }

        for (int k = 0; k < PatchRecord.Lanes; k++) at[k] = sum[k / 4][k % 4];
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
