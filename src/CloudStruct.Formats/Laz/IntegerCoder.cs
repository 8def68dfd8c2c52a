using System.Numerics;

namespace CloudStruct.Formats.Laz;

/// <summary>Integers as differences from a prediction, which wrap by the rules of the format: first how many bits the difference has, then its top 8 bits by model, the rest raw.</summary>
/// <param name="bits">8, 16 or 32.</param>
/// <param name="contexts">Kinds of prediction whose quality differs; they share the models of the difference itself.</param>
internal sealed class IntegerCoder(int bits, int contexts)
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

    /// <summary>Writes an integer.</summary>
    public void Encode(ArithmeticEncoder stream, int predicted, int real, int context)
    {
        unchecked
        {
            int c = real - predicted;
            if (bits < 32) c = (c << (32 - bits)) >> (32 - bits);
            int k = LastBits = c is 0 or 1 ? 0 : 32 - BitOperations.LeadingZeroCount((uint)(c < 0 ? -c : c - 1));
            stream.Symbol(sizes[context] ??= new SymbolModel(bits + 1), k);
            if (k == 0)
            {
                stream.Bit(smallest, c);
            }
            else if (k < 32)
            {
                // Counted through without the two that k = 0 has: negative ones first.
                int e = c < 0 ? c + (1 << k) - 1 : c - 1, low = Math.Max(0, k - 8);
                stream.Symbol(tops[k] ??= new SymbolModel(1 << (k - low)), e >>> low);
                if (low > 0) stream.Raw((uint)e & ((1u << low) - 1), low);
            }
        }
    }
}
