using System.Buffers;

namespace CloudStruct.Records.Points;

/// <summary>A run of points as a file holds them, column by column, in the file's own coordinates and units.</summary>
/// <remarks>Columns are rented: whoever receives a block disposes of it. Fill the arrays and set <see cref="Count"/>.</remarks>
public sealed class SourceBlock : IDisposable
{
    /// <summary>Most points in a block: three double columns take 1.5 MiB.</summary>
    public const int Capacity = 1 << 16;

    /// <summary>A block with room for <see cref="Capacity"/> points.</summary>
    /// <param name="hasColour">Whether colour columns are needed.</param>
    public SourceBlock(bool hasColour)
    {
        HasColour = hasColour;
        if (!hasColour) return;
        Red = ArrayPool<ushort>.Shared.Rent(Capacity);
        Green = ArrayPool<ushort>.Shared.Rent(Capacity);
        Blue = ArrayPool<ushort>.Shared.Rent(Capacity);
    }

    /// <summary>Points in use.</summary>
    public int Count { get; set; }

    /// <summary>Points of this stretch of the file that the file itself marks as deleted and that were left out.</summary>
    public int Withheld { get; set; }

    /// <summary>Whether the colour columns are filled.</summary>
    public bool HasColour { get; }

    /// <summary>File coordinates, longer than <see cref="Count"/>.</summary>
    public double[] X { get; } = ArrayPool<double>.Shared.Rent(Capacity);

    /// <summary>File coordinates.</summary>
    public double[] Y { get; } = ArrayPool<double>.Shared.Rent(Capacity);

    /// <summary>File coordinates.</summary>
    public double[] Z { get; } = ArrayPool<double>.Shared.Rent(Capacity);

    /// <summary>Colour as stored (0-255 or 0-65535; the intake finds out which); empty without colour.</summary>
    public ushort[] Red { get; } = [];

    /// <summary>Colour as stored.</summary>
    public ushort[] Green { get; } = [];

    /// <summary>Colour as stored.</summary>
    public ushort[] Blue { get; } = [];

    /// <summary>Classification as stored; 0 where the format has none.</summary>
    public byte[] Class { get; } = ArrayPool<byte>.Shared.Rent(Capacity);

    /// <inheritdoc/>
    public void Dispose()
    {
        ArrayPool<double>.Shared.Return(X);
        ArrayPool<double>.Shared.Return(Y);
        ArrayPool<double>.Shared.Return(Z);
        ArrayPool<byte>.Shared.Return(Class);
        if (!HasColour) return;
        ArrayPool<ushort>.Shared.Return(Red);
        ArrayPool<ushort>.Shared.Return(Green);
        ArrayPool<ushort>.Shared.Return(Blue);
    }
}
