using System.Runtime.CompilerServices;

namespace CloudStruct.Formats.Laz;

/// <summary>Encoder of Said's integer range coder: the mirror of <see cref="ArithmeticDecoder"/>.</summary>
internal sealed class ArithmeticEncoder
{
    private const uint Smallest = 1u << 24;

    private byte[] bytes;
    private int used;
    private uint low, length = 0xFFFFFFFF;

    /// <summary>An empty stream.</summary>
    /// <param name="expected">Bytes to make room for; more are taken when needed.</param>
    public ArithmeticEncoder(int expected = 256) => bytes = new byte[Math.Max(16, expected)];

    /// <summary>What was written; complete after <see cref="Finish"/>.</summary>
    public ReadOnlySpan<byte> Bytes => bytes.AsSpan(0, used);

    /// <summary>One bit.</summary>
    public void Bit(BitModel model, int bit)
    {
        unchecked
        {
            uint x = model.P0 * (length >> 13);
            if (bit == 0)
            {
                length = x;
                model.Zeros++;
            }
            else
            {
                Raise(x);
                length -= x;
            }

            Renorm();
            if (--model.UntilUpdate == 0) model.Update();
        }
    }

    /// <summary>One symbol.</summary>
    public void Symbol(SymbolModel model, int symbol)
    {
        unchecked
        {
            uint[] sums = model.Sums;
            uint unit = length >> 15, x = sums[symbol] * unit;
            Raise(x);
            // The last symbol has all that is left, the remainder of the division included.
            length = symbol == sums.Length - 1 ? length - x : (sums[symbol + 1] * unit) - x;
            Renorm();
            model.Count(symbol);
        }
    }

    /// <summary>1 to 32 bits that are equally likely either way.</summary>
    public void Raw(uint value, int bits)
    {
        unchecked
        {
            if (bits >= 20)
            {
                Raw(value & 0xFFFF, 16);
                Raw(value >> 16, bits - 16);
                return;
            }

            length >>= bits;
            Raise(value * length);
            Renorm();
        }
    }

    /// <summary>Ends the stream so that a decoder, which reads four bytes ahead, stands exactly at its end after the last symbol.</summary>
    public void Finish()
    {
        unchecked
        {
            bool oneByte = length > 2 * Smallest;
            Raise(oneByte ? Smallest : Smallest / 2);
            length = oneByte ? Smallest / 2 : Smallest >> 9;
            Renorm();
            for (int k = oneByte ? 3 : 2; k > 0; k--) Put(0);
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private void Raise(uint by)
    {
        unchecked
        {
            uint old = low;
            low += by;
            if (low < old) Carry();
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private void Renorm()
    {
        unchecked
        {
            while (length < Smallest)
            {
                Put((byte)(low >> 24));
                low <<= 8;
                length <<= 8;
            }
        }
    }

    private void Carry()
    {
        unchecked
        {
            int at = used - 1;
            while (bytes[at] == 0xFF) bytes[at--] = 0;
            bytes[at]++;
        }
    }

    private void Put(byte b)
    {
        if (used == bytes.Length) Array.Resize(ref bytes, 2 * bytes.Length);
        bytes[used++] = b;
    }
}
