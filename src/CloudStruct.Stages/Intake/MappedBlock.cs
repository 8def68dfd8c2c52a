using System.Buffers;
using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Intake;

/// <summary>A block of a file in map coordinates, with the fingerprint of every place.</summary>
internal sealed class MappedBlock : IDisposable
{
    /// <summary>Maps a block; it may be disposed of afterwards.</summary>
    public MappedBlock(SourceBlock block, PointMap map, int threads, CancellationToken stop)
    {
        (Count, Withheld) = (block.Count, block.Withheld);
        Places = ArrayPool<Vec3>.Shared.Rent(SourceBlock.Capacity);
        Prints = ArrayPool<ulong>.Shared.Rent(SourceBlock.Capacity);
        int[] largest = BlockParallel.Map(Count, threads, stop, (from, to) =>
        {
            for (int i = from; i < to; i++)
            {
                double x = block.X[i], y = block.Y[i], z = block.Z[i];
                bool finite = double.IsFinite(x) && double.IsFinite(y) && double.IsFinite(z);
                Places[i] = finite ? map[x, y, z] : new Vec3(double.NaN, 0, 0);
                Prints[i] = finite ? Fingerprint.Of(Places[i]) : 0;
            }

            int most = 0;
            for (int i = from; i < to && block.HasColour; i++) most = Math.Max(most, Math.Max(block.Red[i], Math.Max(block.Green[i], block.Blue[i])));
            return most;
        });
        LargestColour = largest.Length == 0 ? 0 : largest.Max();
    }

    /// <summary>Points in use.</summary>
    public int Count { get; }

    /// <summary>Points that the file flags as deleted.</summary>
    public long Withheld { get; }

    /// <summary>Map coordinates [m]; x is NaN where a coordinate is no number.</summary>
    public Vec3[] Places { get; }

    /// <summary>See <see cref="Fingerprint"/>.</summary>
    public ulong[] Prints { get; }

    /// <summary>Largest value of any channel; 0 without colour.</summary>
    public int LargestColour { get; }

    /// <inheritdoc/>
    public void Dispose()
    {
        ArrayPool<Vec3>.Shared.Return(Places);
        ArrayPool<ulong>.Shared.Return(Prints);
    }
}
