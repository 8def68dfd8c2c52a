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

    /// <inheritdoc/>
    /// <remarks>A colour that is not grey is told anew at every point, so that its layer is written even where it never changes.</remarks>
    public override bool Needs(int layer, ReadOnlySpan<byte> records, int recordBytes, int at)
    {
        if (layer == 1) return LayerNeed.Differs(records, recordBytes, at + 6, 2);
        if (LayerNeed.Differs(records, recordBytes, at, 6)) return true;
        return records.Length > recordBytes && !ColourModels.IsGrey(records[at..]);
    }

    /// <inheritdoc/>
    protected override void Encode(int channel, ReadOnlySpan<ArithmeticEncoder?> layers, ReadOnlySpan<byte> previous, ReadOnlySpan<byte> now)
    {
        unchecked
        {
            if (layers[0] is { } colour) (colours[channel] ??= new ColourModels()).Put(colour, previous, now);
            if (!infrared || layers[1] is not { } near) return;
            int u = (now[6] != previous[6] ? 1 : 0) | (now[7] != previous[7] ? 2 : 0);
            near.Symbol(used[channel] ??= new SymbolModel(4), u);
            if ((u & 1) != 0) near.Symbol(low[channel] ??= new SymbolModel(256), (byte)(now[6] - previous[6]));
            if ((u & 2) != 0) near.Symbol(high[channel] ??= new SymbolModel(256), (byte)(now[7] - previous[7]));
        }
    }
}
