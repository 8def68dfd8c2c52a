namespace CloudStruct.Formats.Laz;

/// <summary>The wave packet of point formats 4 and 5.</summary>
internal sealed class WavePacket : PointwiseItem
{
    private readonly WaveModels models = new();

    /// <inheritdoc/>
    public override void Start(ReadOnlySpan<byte> raw)
    {
    }

    /// <inheritdoc/>
    public override void Next(ArithmeticDecoder stream, Span<byte> to) => models.Next(stream, to);
}
