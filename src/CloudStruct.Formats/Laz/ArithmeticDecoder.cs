using System.Runtime.CompilerServices;

namespace CloudStruct.Formats.Laz;

/// <summary>Decoder of Said's integer range coder over a run of bytes.</summary>
internal sealed class ArithmeticDecoder
{
    private const uint Smallest = 1u << 24;

    private readonly byte[] bytes;
    private readonly int end;
    private int at;
    private uint value, length = 0xFFFFFFFF;

    /// <summary>Starts at a place; the stream must not read past the end.</summary>
    /// <exception cref="LazDamageException">Fewer than four bytes, or a start that no encoder writes.</exception>
    public ArithmeticDecoder(byte[] bytes, int from, int end)
    {
        this.bytes = bytes;
        this.end = end;
        at = from;
        for (int k = 0; k < 4; k++) value = (value << 8) | Next();
        if (value == length) throw new LazDamageException("a compressed stream starts with what no encoder writes");
    }

    /// <summary>Where the decoder stands: at the end of a stream that was read whole.</summary>
    public int At => at;

    /// <summary>One bit.</summary>
    public int Bit(BitModel model)
    {
        unchecked
        {
            uint x = model.P0 * (length >> 13);
            int bit = 0;
            if (value < x)
            {
                length = x;
                model.Zeros++;
            }
            else
            {
                value -= x;
                length -= x;
                bit = 1;
            }

            Renorm();
            if (--model.UntilUpdate == 0) model.Update();
            return bit;
        }
    }

    /// <summary>One symbol.</summary>
    public int Symbol(SymbolModel model)
    {
        unchecked
        {
            uint full = length, unit = length >> 15, q = value / unit;
            uint[] sums = model.Sums;
            int s;
            if (model.Slots is not { } slots)
            {
                s = 0;
                while (s + 1 < sums.Length && sums[s + 1] <= q) s++;
            }
            else
            {
                // The remainder of the division can lift the quotient a little above 2^15: the last slot is there for that.
                int slot = Math.Min((int)(q >> model.Shift), slots.Length - 2), after = slots[slot + 1] + 1;
                s = slots[slot];
                while (after > s + 1)
                {
                    int middle = (s + after) >> 1;
                    if (sums[middle] > q) after = middle;
                    else s = middle;
                }
            }

            uint low = sums[s] * unit, high = s == sums.Length - 1 ? full : sums[s + 1] * unit;
            value -= low;
            length = high - low;
            Renorm();
            model.Count(s);
            return s;
        }
    }

    /// <summary>1 to 32 bits that are equally likely either way.</summary>
    public uint Raw(int bits)
    {
        unchecked
        {
            if (bits >= 20)
            {
                uint low = Raw(16);
                return (Raw(bits - 16) << 16) | low;
            }

            length >>= bits;
            uint v = value / length;
            value -= v * length;
            Renorm();
            return v >> bits == 0 ? v : throw new LazDamageException("a compressed number has too many bits");
        }
    }

    /// <summary>64 raw bits, low half first.</summary>
    public ulong Raw64()
    {
        uint low = Raw(32);
        return ((ulong)Raw(32) << 32) | low;
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private void Renorm()
    {
        unchecked
        {
            while (length < Smallest)
            {
                value = (value << 8) | Next();
                length <<= 8;
            }
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private byte Next() => at < end ? bytes[at++] : throw new LazDamageException("a compressed stream ends before its points");
}
