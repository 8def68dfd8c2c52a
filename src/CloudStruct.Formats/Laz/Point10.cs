using System.Buffers.Binary;

namespace CloudStruct.Formats.Laz;

/// <summary>The 20 bytes common to point formats 0 to 5, version 2.</summary>
internal sealed class Point10 : PointwiseItem
{
    private readonly SymbolModel changed = new(64);
    private readonly SymbolModel?[] angle = new SymbolModel?[2], flagByte = new SymbolModel?[256], classification = new SymbolModel?[256], user = new SymbolModel?[256];
    private readonly IntegerDecoder intensity = new(16, 4), source = new(16, 1), dx = new(32, 2), dy = new(32, 22), z = new(32, 20);
    private readonly ushort[] lastIntensity = new ushort[16];   // the raw record does not enter here
    private readonly int[] lastZ = new int[8];
    private readonly RunningMedian[] medianX = new RunningMedian[16], medianY = new RunningMedian[16];

    /// <inheritdoc/>
    public override void Start(ReadOnlySpan<byte> raw)
    {
    }

    /// <inheritdoc/>
    public override void Next(ArithmeticDecoder stream, Span<byte> to)
    {
        unchecked
        {
            int ch = stream.Symbol(changed);
            if ((ch & 32) != 0) to[14] = (byte)stream.Symbol(Of(flagByte, to[14], 256));
            int r = to[14] & 7, n = (to[14] >> 3) & 7, m = ReturnTables.NarrowMap(n, r), l = ReturnTables.NarrowLevel(n, r);
            if ((ch & 16) != 0) lastIntensity[m] = (ushort)intensity.Decode(stream, lastIntensity[m], Math.Min(m, 3));
            BinaryPrimitives.WriteUInt16LittleEndian(to[12..], lastIntensity[m]);
            if ((ch & 8) != 0) to[15] = (byte)stream.Symbol(Of(classification, to[15], 256));
            if ((ch & 4) != 0) to[16] += (byte)stream.Symbol(Of(angle, (to[14] >> 6) & 1, 256));
            if ((ch & 2) != 0) to[17] = (byte)stream.Symbol(Of(user, to[17], 256));
            if ((ch & 1) != 0) BinaryPrimitives.WriteUInt16LittleEndian(to[18..], (ushort)source.Decode(stream, BinaryPrimitives.ReadUInt16LittleEndian(to[18..]), 0));

            int only = n == 1 ? 1 : 0;
            int d = dx.Decode(stream, medianX[m].Middle, only);
            medianX[m].Add(d);
            BinaryPrimitives.WriteInt32LittleEndian(to, BinaryPrimitives.ReadInt32LittleEndian(to) + d);
            int bits = dx.LastBits;
            d = dy.Decode(stream, medianY[m].Middle, only + ReturnTables.Even(bits, 20));
            medianY[m].Add(d);
            BinaryPrimitives.WriteInt32LittleEndian(to[4..], BinaryPrimitives.ReadInt32LittleEndian(to[4..]) + d);
            lastZ[l] = z.Decode(stream, lastZ[l], only + ReturnTables.Even((bits + dy.LastBits) / 2, 18));
            BinaryPrimitives.WriteInt32LittleEndian(to[8..], lastZ[l]);
        }
    }
}
