namespace CloudStruct.Formats.Laz;

/// <summary>Red, green and blue of 16 bits: bytes as differences, green and blue predicted from what red did. Shared by both forms.</summary>
internal sealed class ColourModels
{
    private readonly SymbolModel used = new(128);
    private readonly SymbolModel?[] bytes = new SymbolModel?[6];

    /// <summary>The next colour.</summary>
    /// <param name="stream">Its stream.</param>
    /// <param name="c">Six bytes, low before high: the previous colour, then the new one.</param>
    public void Next(ArithmeticDecoder stream, Span<byte> c)
    {
        unchecked
        {
            int u = stream.Symbol(used);
            (int redLow, int redHigh, int greenLow, int greenHigh) = (c[0], c[1], c[2], c[3]);
            if ((u & 1) != 0) c[0] = (byte)(redLow + Take(stream, 0));
            if ((u & 2) != 0) c[1] = (byte)(redHigh + Take(stream, 1));
            if ((u & 64) == 0)
            {
                c[..2].CopyTo(c[2..]);
                c[..2].CopyTo(c[4..]);
                return;
            }

            int e = c[0] - redLow;
            if ((u & 4) != 0) c[2] = (byte)(Clamp(greenLow + e) + Take(stream, 2));
            e = (e + c[2] - greenLow) / 2;
            if ((u & 16) != 0) c[4] = (byte)(Clamp(c[4] + e) + Take(stream, 4));
            int h = c[1] - redHigh;
            if ((u & 8) != 0) c[3] = (byte)(Clamp(greenHigh + h) + Take(stream, 3));
            h = (h + c[3] - greenHigh) / 2;
            if ((u & 32) != 0) c[5] = (byte)(Clamp(c[5] + h) + Take(stream, 5));
        }
    }

    private static int Clamp(int v) => Math.Clamp(v, 0, 255);

    private int Take(ArithmeticDecoder stream, int k) => stream.Symbol(bytes[k] ??= new SymbolModel(256));
}
