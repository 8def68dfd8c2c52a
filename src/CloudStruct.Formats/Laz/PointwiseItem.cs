namespace CloudStruct.Formats.Laz;

/// <summary>One piece of the record in chunks whose points are coded one after the other from a single stream.</summary>
internal abstract class PointwiseItem
{
    /// <summary>Takes the raw piece of the chunk's first record.</summary>
    public abstract void Start(ReadOnlySpan<byte> raw);

    /// <summary>Decodes the piece of the next record.</summary>
    /// <param name="stream">The chunk's stream.</param>
    /// <param name="to">Holds the previous piece; takes the new one.</param>
    public abstract void Next(ArithmeticDecoder stream, Span<byte> to);

    /// <summary>A model of an array, made when first used: most contexts never are.</summary>
    protected static SymbolModel Of(SymbolModel?[] models, int at, int symbols) => models[at] ??= new SymbolModel(symbols);
}
