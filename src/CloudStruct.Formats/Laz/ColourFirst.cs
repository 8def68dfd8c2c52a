namespace CloudStruct.Formats.Laz;

/// <summary>The colour of point formats 2, 3 and 5, version 1: each byte by itself.</summary>
internal sealed class ColourFirst : PointwiseItem
{
    private readonly SymbolModel used = new(64);
    private readonly IntegerCoder bytes = new(8, 6);

    /// <inheritdoc/>
    public override void Start(ReadOnlySpan<byte> raw)
    {
    }

    /// <inheritdoc/>
    public override void Next(ArithmeticDecoder stream, Span<byte> to)
    {
        unchecked
        {
            int u = stream.Symbol(used);
            for (int i = 0; i < 6; i++)
            {
                if ((u & (1 << i)) != 0) to[i] = (byte)bytes.Decode(stream, to[i], i);
            }
        }
    }
}
