using System.Numerics;
using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Thin;

/// <summary>Input points gathered into cubic voxels as they stream by: one real point is kept in each, near the voxel's mean.</summary>
/// <remarks>One pass only. Against each new point the mean so far decides whether it or the held point stays, which with
/// the few points that fall into a voxel is nearly always the point nearest to the final mean. A point in the mean
/// itself would round every edge by a third of a voxel; the point nearest to the middle of the voxel would pull level
/// rock into terraces.
/// The table is cut into parts by a hash of the voxel, so that all cores fill it; each part meets its points in the order of the
/// stream, so that the result does not depend on them.</remarks>
internal sealed class VoxelTable
{
    private const int PartBits = 4;
    private const int Parts = 1 << PartBits;
    private const int AxisBits = 21;
    private const int Half = 1 << (AxisBits - 1);

    private readonly double edgeM;
    private readonly VoxelPart[] parts = [.. Enumerable.Range(0, Parts).Select(_ => new VoxelPart())];

    // Of the block that is being taken in: voxel of each point, its part, and the points sorted by part.
    private readonly long[] keys = new long[PointBlock.Capacity];
    private readonly byte[] partOf = new byte[PointBlock.Capacity];
    private readonly int[] byPart = new int[PointBlock.Capacity];
    private readonly int[] ends = new int[Parts + 1];
    private long points;

    /// <summary>An empty table.</summary>
    /// <param name="edgeM">Edge of a voxel [m].</param>
    public VoxelTable(double edgeM) => this.edgeM = edgeM;

    /// <summary>Voxels in use.</summary>
    public int Count => parts.Sum(p => p.Count);

    /// <summary>Smallest edge whose numbers still fit for a cloud that reaches this far from the local origin [m].</summary>
    public static double SmallestEdgeM(double reachM) => 1.01 * reachM / Half;

    /// <summary>Voxel by its handle (see <see cref="InOrder"/>).</summary>
    public ref Voxel this[int handle] => ref parts[handle & (Parts - 1)][handle >> PartBits];

    /// <summary>Takes in a block.</summary>
    public void Add(PointBlock block, int threads)
    {
        BlockParallel.For(block.Count, threads, CancellationToken.None, (from, to) =>
        {
            ReadOnlySpan<float> x = block.X, y = block.Y, z = block.Z;
            for (int i = from; i < to; i++)
            {
                double ix = Math.Floor(x[i] / edgeM), iy = Math.Floor(y[i] / edgeM), iz = Math.Floor(z[i] / edgeM);
                keys[i] = ((((long)iz + Half) << (2 * AxisBits)) | (((long)iy + Half) << AxisBits)) | ((long)ix + Half);
                partOf[i] = (byte)(VoxelPart.Mix(keys[i]) >> (32 - PartBits));
            }
        });

        // Stable by part: ends[p] runs from the first place of part p to that of the next.
        Array.Clear(ends);
        for (int i = 0; i < block.Count; i++) ends[partOf[i] + 1]++;
        for (int p = 1; p < Parts; p++) ends[p] += ends[p - 1];
        for (int i = 0; i < block.Count; i++) byPart[ends[partOf[i]]++] = i;
        BlockParallel.For(Parts, threads, CancellationToken.None, (from, to) =>
        {
            for (int p = from; p < to; p++) Fill(parts[p], block, byPart.AsSpan((p == 0 ? 0 : ends[p - 1])..ends[p]));
        }, 1);
        points += block.Count;
    }

    /// <summary>Handles of all voxels in the order in which the stream first met them.</summary>
    public int[] InOrder(int threads)
    {
        var met = new ulong[(points / 64) + 1];   // a bit for each point of the stream that opened a voxel
        BlockParallel.For(Parts, threads, CancellationToken.None, (from, to) =>
        {
            for (int p = from; p < to; p++)
            {
                for (int v = 0; v < parts[p].Count; v++) Interlocked.Or(ref met[parts[p][v].First >> 6], 1UL << (int)(parts[p][v].First & 63));
            }
        }, 1);
        var before = new int[met.Length];
        for (int w = 1; w < met.Length; w++) before[w] = before[w - 1] + BitOperations.PopCount(met[w - 1]);
        var order = new int[Count];
        BlockParallel.For(Parts, threads, CancellationToken.None, (from, to) =>
        {
            for (int p = from; p < to; p++)
            {
                for (int v = 0; v < parts[p].Count; v++)
                {
                    long first = parts[p][v].First;
                    ulong lower = met[first >> 6] & ((1UL << (int)(first & 63)) - 1);
                    order[before[first >> 6] + BitOperations.PopCount(lower)] = (v << PartBits) | p;
                }
            }
        }, 1);
        return order;
    }

    private void Fill(VoxelPart part, PointBlock block, ReadOnlySpan<int> some)
    {
        ReadOnlySpan<float> xs = block.X, ys = block.Y, zs = block.Z;
        ReadOnlySpan<byte> red = block.Red, green = block.Green, blue = block.Blue, cls = block.Class;
        foreach (int i in some)
        {
            float x = xs[i], y = ys[i], z = zs[i];
            double ix = Math.Floor(x / edgeM), iy = Math.Floor(y / edgeM), iz = Math.Floor(z / edgeM);
            ref Voxel v = ref part.Find(keys[i], points + i);
            v.Take((float)(x - (ix * edgeM)), (float)(y - (iy * edgeM)), (float)(z - (iz * edgeM)), x, y, z);
            v.Red += red[i];
            v.Green += green[i];
            v.Blue += blue[i];
            v.Vote(cls[i]);
        }
    }
}
