namespace CloudStruct.Formats.Laz;

/// <summary>Bytes beyond the standard fields of point formats 6 to 10: a layer for each.</summary>
internal sealed class LayeredBytes(int count, bool version4) : Companion(count, version4)
{
    private readonly SymbolModel?[] models = new SymbolModel?[4 * count];

    /// <inheritdoc/>
    public override int LayerCount => Bytes;

    /// <inheritdoc/>
    protected override void Decode(int channel, ReadOnlySpan<ArithmeticDecoder?> layers, Span<byte> value)
    {
        unchecked
        {
            for (int i = 0; i < value.Length; i++)
            {
                if (layers[i] is { } stream) value[i] += (byte)stream.Symbol(models[(channel * value.Length) + i] ??= new SymbolModel(256));
            }
        }
    }

    /// <inheritdoc/>
    public override bool Needs(int layer, ReadOnlySpan<byte> records, int recordBytes, int at) => LayerNeed.Differs(records, recordBytes, at + layer, 1);

    /// <inheritdoc/>
    protected override void Encode(int channel, ReadOnlySpan<ArithmeticEncoder?> layers, ReadOnlySpan<byte> previous, ReadOnlySpan<byte> now)
    {
        unchecked
        {
            for (int i = 0; i < previous.Length; i++)
            {
                if (layers[i] is { } stream) stream.Symbol(models[(channel * previous.Length) + i] ??= new SymbolModel(256), (byte)(now[i] - previous[i]));
            }
        }
    }
}
