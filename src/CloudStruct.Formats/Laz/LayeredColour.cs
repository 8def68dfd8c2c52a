namespace CloudStruct.Formats.Laz;

/// <summary>The colour of point formats 7, 8 and 10, with near infrared in a layer of its own where there is one.</summary>
internal sealed class LayeredColour(bool infrared, bool version4) : Companion(infrared ? 8 : 6, version4)
{
    private readonly ColourModels?[] colours = new ColourModels?[4];
    private readonly SymbolModel?[] used = new SymbolModel?[4], low = new SymbolModel?[4], high = new SymbolModel?[4];

    /// <inheritdoc/>
    public override int LayerCount => infrared ? 2 : 1;

    /// <inheritdoc/>
    protected override void Decode(int channel, ReadOnlySpan<ArithmeticDecoder?> layers, Span<byte> value)
    {
        unchecked
        {
            if (layers[0] is { } colour) (colours[channel] ??= new ColourModels()).Next(colour, value[..6]);
            if (!infrared || layers[1] is not { } near) return;
            int u = near.Symbol(used[channel] ??= new SymbolModel(4));
            if ((u & 1) != 0) value[6] += (byte)near.Symbol(low[channel] ??= new SymbolModel(256));
            if ((u & 2) != 0) value[7] += (byte)near.Symbol(high[channel] ??= new SymbolModel(256));
        }
    }
}
