using System.Buffers.Binary;

namespace CloudStruct.Formats.Laz;

/// <summary>The 20 bytes common to point formats 0 to 5, version 1: coordinates first, other bits, medians of three.</summary>
internal sealed class Point10First : PointwiseItem
{
    private readonly SymbolModel changed = new(64);
    private readonly SymbolModel?[] flagByte = new SymbolModel?[256], classification = new SymbolModel?[256], user = new SymbolModel?[256];
    private readonly IntegerCoder dx = new(32, 1), dy = new(32, 20), z = new(32, 20), intensity = new(16, 1), angle = new(8, 2), source = new(16, 1);
    private readonly int[] lastX = new int[3], lastY = new int[3];
    private int slot;

    /// <inheritdoc/>
    public override void Start(ReadOnlySpan<byte> raw)
    {
    }

    /// <inheritdoc/>
    public override void Next(ArithmeticDecoder stream, Span<byte> to)
    {
        unchecked
        {
            int d = dx.Decode(stream, Median(lastX), 0), bits = dx.LastBits;
            BinaryPrimitives.WriteInt32LittleEndian(to, BinaryPrimitives.ReadInt32LittleEndian(to) + d);
            int e = dy.Decode(stream, Median(lastY), Math.Min(bits, 19));
            BinaryPrimitives.WriteInt32LittleEndian(to[4..], BinaryPrimitives.ReadInt32LittleEndian(to[4..]) + e);
            (lastX[slot], lastY[slot]) = (d, e);
            slot = (slot + 1) % 3;
            int k = (bits + dy.LastBits) / 2;
            BinaryPrimitives.WriteInt32LittleEndian(to[8..], z.Decode(stream, BinaryPrimitives.ReadInt32LittleEndian(to[8..]), Math.Min(k, 19)));

            int ch = stream.Symbol(changed);
            if ((ch & 32) != 0) BinaryPrimitives.WriteUInt16LittleEndian(to[12..], (ushort)intensity.Decode(stream, BinaryPrimitives.ReadUInt16LittleEndian(to[12..]), 0));
            if ((ch & 16) != 0) to[14] = (byte)stream.Symbol(Of(flagByte, to[14], 256));
            if ((ch & 8) != 0) to[15] = (byte)stream.Symbol(Of(classification, to[15], 256));
            if ((ch & 4) != 0) to[16] = (byte)angle.Decode(stream, to[16], k < 3 ? 1 : 0);
            if ((ch & 2) != 0) to[17] = (byte)stream.Symbol(Of(user, to[17], 256));
            if ((ch & 1) != 0) BinaryPrimitives.WriteUInt16LittleEndian(to[18..], (ushort)source.Decode(stream, BinaryPrimitives.ReadUInt16LittleEndian(to[18..]), 0));
        }
    }

    private static int Median(int[] v) => Math.Max(Math.Min(v[0], v[1]), Math.Min(Math.Max(v[0], v[1]), v[2]));
}
