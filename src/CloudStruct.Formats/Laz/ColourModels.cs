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

    /// <summary>Writes a colour.</summary>
    /// <param name="stream">Its stream.</param>
    /// <param name="p">Six bytes: the previous colour.</param>
    /// <param name="c">Six bytes: the colour.</param>
    public void Put(ArithmeticEncoder stream, ReadOnlySpan<byte> p, ReadOnlySpan<byte> c)
    {
        unchecked
        {
            int u = IsGrey(c) ? 0 : 64;
            for (int k = 0; k < 6; k++)
            {
                if (p[k] != c[k]) u |= 1 << k;
            }

            stream.Symbol(used, u);
            if ((u & 1) != 0) Give(stream, 0, c[0] - p[0]);
            if ((u & 2) != 0) Give(stream, 1, c[1] - p[1]);
            if ((u & 64) == 0) return;
            int e = c[0] - p[0], h = c[1] - p[1];
            if ((u & 4) != 0) Give(stream, 2, c[2] - Clamp(p[2] + e));
            if ((u & 16) != 0) Give(stream, 4, c[4] - Clamp(p[4] + ((e + c[2] - p[2]) / 2)));
            if ((u & 8) != 0) Give(stream, 3, c[3] - Clamp(p[3] + h));
            if ((u & 32) != 0) Give(stream, 5, c[5] - Clamp(p[5] + ((h + c[3] - p[3]) / 2)));
        }
    }

    /// <summary>Whether red, green and blue of a colour are the same.</summary>
    public static bool IsGrey(ReadOnlySpan<byte> c) => c[0] == c[2] && c[0] == c[4] && c[1] == c[3] && c[1] == c[5];

    private static int Clamp(int v) => Math.Clamp(v, 0, 255);

    private int Take(ArithmeticDecoder stream, int k) => stream.Symbol(bytes[k] ??= new SymbolModel(256));

    private void Give(ArithmeticEncoder stream, int k, int difference) => stream.Symbol(bytes[k] ??= new SymbolModel(256), unchecked((byte)difference));
}
