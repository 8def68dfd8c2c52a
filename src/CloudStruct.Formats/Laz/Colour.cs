namespace CloudStruct.Formats.Laz;

/// <summary>The colour of point formats 2, 3 and 5, version 2.</summary>
internal sealed class Colour : PointwiseItem, IPointwisePut
{
    private readonly ColourModels models = new();

    /// <inheritdoc/>
    public override void Start(ReadOnlySpan<byte> raw)
    {
    }

    /// <inheritdoc/>
    public override void Next(ArithmeticDecoder stream, Span<byte> to) => models.Next(stream, to);

    /// <inheritdoc/>
    public void Put(ArithmeticEncoder stream, ReadOnlySpan<byte> previous, ReadOnlySpan<byte> now) => models.Put(stream, previous, now);
}
