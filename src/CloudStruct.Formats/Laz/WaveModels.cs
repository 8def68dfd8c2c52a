using System.Buffers.Binary;

namespace CloudStruct.Formats.Laz;

/// <summary>Wave packets: 29 bytes. Shared by both forms.</summary>
internal sealed class WaveModels
{
    private readonly SymbolModel index = new(256);
    private readonly SymbolModel?[] kinds = new SymbolModel?[4];
    private readonly IntegerCoder difference = new(32, 1), size = new(32, 1), returnPoint = new(32, 1), xyz = new(32, 3);
    private int lastKind, lastDifference;

    /// <summary>The next packet.</summary>
    /// <param name="stream">Its stream.</param>
    /// <param name="w">29 bytes: the previous packet, then the new one.</param>
    public void Next(ArithmeticDecoder stream, Span<byte> w)
    {
        unchecked
        {
            w[0] = (byte)stream.Symbol(index);
            lastKind = stream.Symbol(kinds[lastKind] ??= new SymbolModel(4));
            ulong offset = BinaryPrimitives.ReadUInt64LittleEndian(w[1..]);
            uint bytes = BinaryPrimitives.ReadUInt32LittleEndian(w[9..]);
            switch (lastKind)
            {
                case 1: offset += bytes; break;
                case 2:
                    lastDifference = difference.Decode(stream, lastDifference, 0);
                    offset += (ulong)(long)lastDifference;
                    break;
                case 3: offset = stream.Raw64(); break;
            }

            BinaryPrimitives.WriteUInt64LittleEndian(w[1..], offset);
            Code(stream, size, w[9..], 0);
            Code(stream, returnPoint, w[13..], 0);
            for (int k = 0; k < 3; k++) Code(stream, xyz, w[(17 + (4 * k))..], k);
        }
    }

    private static void Code(ArithmeticDecoder stream, IntegerCoder with, Span<byte> at, int context) =>
        BinaryPrimitives.WriteInt32LittleEndian(at, with.Decode(stream, BinaryPrimitives.ReadInt32LittleEndian(at), context));
}
