namespace CloudStruct.Formats.Laz;

/// <summary>Bytes beyond the standard fields of point formats 0 to 5, version 2.</summary>
internal sealed class ExtraBytes(int count) : PointwiseItem, IPointwisePut
{
    private readonly SymbolModel?[] models = new SymbolModel?[count];

    /// <inheritdoc/>
    public override void Start(ReadOnlySpan<byte> raw)
    {
    }

    /// <inheritdoc/>
    public override void Next(ArithmeticDecoder stream, Span<byte> to)
    {
        unchecked
        {
            for (int i = 0; i < models.Length; i++) to[i] += (byte)stream.Symbol(Of(models, i, 256));
        }
    }

    /// <inheritdoc/>
    public void Put(ArithmeticEncoder stream, ReadOnlySpan<byte> previous, ReadOnlySpan<byte> now)
    {
        unchecked
        {
            for (int i = 0; i < models.Length; i++) stream.Symbol(Of(models, i, 256), (byte)(now[i] - previous[i]));
        }
    }
}
