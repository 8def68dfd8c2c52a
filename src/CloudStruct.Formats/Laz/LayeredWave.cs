namespace CloudStruct.Formats.Laz;

/// <summary>The wave packet of point formats 9 and 10.</summary>
internal sealed class LayeredWave(bool version4) : Companion(29, version4)
{
    private readonly WaveModels?[] models = new WaveModels?[4];

    /// <inheritdoc/>
    public override int LayerCount => 1;

    /// <inheritdoc/>
    protected override void Decode(int channel, ReadOnlySpan<ArithmeticDecoder?> layers, Span<byte> value)
    {
        if (layers[0] is { } stream) (models[channel] ??= new WaveModels()).Next(stream, value);
    }

    /// <inheritdoc/>
    public override bool Needs(int layer, ReadOnlySpan<byte> records, int recordBytes, int at) => throw NotWritten();

    /// <inheritdoc/>
    protected override void Encode(int channel, ReadOnlySpan<ArithmeticEncoder?> layers, ReadOnlySpan<byte> previous, ReadOnlySpan<byte> now) => throw NotWritten();

    private static NotSupportedException NotWritten() => new("wave packets are read, not written");
}
