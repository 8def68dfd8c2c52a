namespace CloudStruct.Formats.Laz;

/// <summary>Bytes beyond the standard fields of point formats 0 to 5, version 1.</summary>
internal sealed class ExtraBytesFirst(int count) : PointwiseItem
{
    private readonly IntegerCoder bytes = new(8, count);

    /// <inheritdoc/>
    public override void Start(ReadOnlySpan<byte> raw)
    {
    }

    /// <inheritdoc/>
    public override void Next(ArithmeticDecoder stream, Span<byte> to)
    {
        unchecked
        {
            for (int i = 0; i < count; i++) to[i] = (byte)bytes.Decode(stream, to[i], i);
        }
    }
}
