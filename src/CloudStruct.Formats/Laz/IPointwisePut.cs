namespace CloudStruct.Formats.Laz;

/// <summary>A piece that is also written: items of version 2, without wave packets.</summary>
internal interface IPointwisePut
{
    /// <summary>Encodes the piece of the next record.</summary>
    /// <param name="stream">The chunk's stream.</param>
    /// <param name="previous">The piece of the record before.</param>
    /// <param name="now">The piece.</param>
    void Put(ArithmeticEncoder stream, ReadOnlySpan<byte> previous, ReadOnlySpan<byte> now);
}
