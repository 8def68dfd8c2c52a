using System.Buffers.Binary;

namespace CloudStruct.Formats.Laz;

/// <summary>The GPS time of point formats 1, 3, 4 and 5, version 2.</summary>
internal sealed class GpsTime : PointwiseItem, IPointwisePut
{
    private readonly TimeSequences times = new(layered: false);

    /// <inheritdoc/>
    public override void Start(ReadOnlySpan<byte> raw) => times.Start(BinaryPrimitives.ReadInt64LittleEndian(raw));

    /// <inheritdoc/>
    public override void Next(ArithmeticDecoder stream, Span<byte> to) => BinaryPrimitives.WriteInt64LittleEndian(to, times.Next(stream));

    /// <inheritdoc/>
    public void Put(ArithmeticEncoder stream, ReadOnlySpan<byte> previous, ReadOnlySpan<byte> now) => times.Put(stream, BinaryPrimitives.ReadInt64LittleEndian(now));
}
