namespace CloudStruct.Formats.Laz;

/// <summary>Integers as differences from a prediction, which wrap by the rules of the format: first how many bits the difference has, then its top 8 bits by model, the rest raw.</summary>
/// <param name="bits">8, 16 or 32.</param>
/// <param name="contexts">Kinds of prediction whose quality differs; they share the models of the difference itself.</param>
internal sealed class IntegerDecoder(int bits, int contexts)
{
    private readonly SymbolModel?[] sizes = new SymbolModel?[contexts];
    private readonly SymbolModel?[] tops = new SymbolModel?[bits + 1];
    private readonly BitModel smallest = new();

    /// <summary>Bits of the last difference: how good the last prediction was.</summary>
    public int LastBits { get; private set; }

    /// <summary>The next integer.</summary>
    public int Decode(ArithmeticDecoder stream, int predicted, int context)
    {
        unchecked
        {
            int k = LastBits = stream.Symbol(sizes[context] ??= new SymbolModel(bits + 1));
            int c;
            if (k == 0)
            {
                c = stream.Bit(smallest);
            }
            else if (k < 32)
            {
                c = stream.Symbol(tops[k] ??= new SymbolModel(1 << Math.Min(k, 8)));
                if (k > 8) c = (c << (k - 8)) | (int)stream.Raw(k - 8);
                if (c >= 1 << (k - 1)) c++;
                else c -= (1 << k) - 1;
            }
            else
            {
                c = int.MinValue;
            }

            int v = predicted + c;
            if (bits == 32) return v;
            return v < 0 ? v + (1 << bits) : v >= 1 << bits ? v - (1 << bits) : v;
        }
    }
}
