using System.Buffers;

namespace CloudStruct.Records.Points;

/// <summary>A run of points in the survey frame, column by column: local metres as floats, colour as 0-255.</summary>
/// <remarks>The receiver disposes. <see cref="Index"/> tells the place of each point in its file.</remarks>
public sealed class PointBlock : IDisposable
{
    /// <summary>Most points in a block.</summary>
    public const int Capacity = SourceBlock.Capacity;

    private readonly float[] columns = ArrayPool<float>.Shared.Rent(3 * Capacity);
    private readonly byte[] bytes = ArrayPool<byte>.Shared.Rent(4 * Capacity);
    private readonly long[] index = ArrayPool<long>.Shared.Rent(Capacity);

    /// <summary>Points in use.</summary>
    public int Count { get; set; }

    /// <summary>Number of the file in the order of the survey's sources.</summary>
    public int Tile { get; set; }

    /// <summary>East, local [m]; as long as <see cref="Capacity"/>.</summary>
    public Span<float> X => columns.AsSpan(0, Capacity);

    /// <summary>North, local [m].</summary>
    public Span<float> Y => columns.AsSpan(Capacity, Capacity);

    /// <summary>Up, local [m].</summary>
    public Span<float> Z => columns.AsSpan(2 * Capacity, Capacity);

    /// <summary>0-255; zero without colour.</summary>
    public Span<byte> Red => bytes.AsSpan(0, Capacity);

    /// <summary>0-255.</summary>
    public Span<byte> Green => bytes.AsSpan(Capacity, Capacity);

    /// <summary>0-255.</summary>
    public Span<byte> Blue => bytes.AsSpan(2 * Capacity, Capacity);

    /// <summary>Classification of the file.</summary>
    public Span<byte> Class => bytes.AsSpan(3 * Capacity, Capacity);

    /// <summary>Place of the point in its file, counting from 0.</summary>
    public Span<long> Index => index.AsSpan(0, Capacity);

    /// <inheritdoc/>
    public void Dispose()
    {
        ArrayPool<float>.Shared.Return(columns);
        ArrayPool<byte>.Shared.Return(bytes);
        ArrayPool<long>.Shared.Return(index);
    }
}
