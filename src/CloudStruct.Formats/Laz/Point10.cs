using System.Buffers.Binary;

namespace CloudStruct.Formats.Laz;

/// <summary>The 20 bytes common to point formats 0 to 5, version 2.</summary>
internal sealed class Point10 : PointwiseItem, IPointwisePut
{
    private readonly SymbolModel changed = new(64);
    private readonly SymbolModel?[] angle = new SymbolModel?[2], flagByte = new SymbolModel?[256], classification = new SymbolModel?[256], user = new SymbolModel?[256];
    private readonly IntegerCoder intensity = new(16, 4), source = new(16, 1), dx = new(32, 2), dy = new(32, 22), z = new(32, 20);
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

    /// <inheritdoc/>
    public void Put(ArithmeticEncoder stream, ReadOnlySpan<byte> previous, ReadOnlySpan<byte> now)
    {
        unchecked
        {
            int r = now[14] & 7, n = (now[14] >> 3) & 7, m = ReturnTables.NarrowMap(n, r), l = ReturnTables.NarrowLevel(n, r);
            ushort strength = BinaryPrimitives.ReadUInt16LittleEndian(now[12..]), from = BinaryPrimitives.ReadUInt16LittleEndian(now[18..]), fromBefore = BinaryPrimitives.ReadUInt16LittleEndian(previous[18..]);
            int ch = (now[14] != previous[14] ? 32 : 0) | (strength != lastIntensity[m] ? 16 : 0) | (now[15] != previous[15] ? 8 : 0)
                | (now[16] != previous[16] ? 4 : 0) | (now[17] != previous[17] ? 2 : 0) | (from != fromBefore ? 1 : 0);
            stream.Symbol(changed, ch);
            if ((ch & 32) != 0) stream.Symbol(Of(flagByte, previous[14], 256), now[14]);
            if ((ch & 16) != 0)
            {
                intensity.Encode(stream, lastIntensity[m], strength, Math.Min(m, 3));
                lastIntensity[m] = strength;
            }

            if ((ch & 8) != 0) stream.Symbol(Of(classification, previous[15], 256), now[15]);
            if ((ch & 4) != 0) stream.Symbol(Of(angle, (now[14] >> 6) & 1, 256), (byte)(now[16] - previous[16]));
            if ((ch & 2) != 0) stream.Symbol(Of(user, previous[17], 256), now[17]);
            if ((ch & 1) != 0) source.Encode(stream, fromBefore, from, 0);

            int only = n == 1 ? 1 : 0;
            int d = BinaryPrimitives.ReadInt32LittleEndian(now) - BinaryPrimitives.ReadInt32LittleEndian(previous);
            dx.Encode(stream, medianX[m].Middle, d, only);
            medianX[m].Add(d);
            d = BinaryPrimitives.ReadInt32LittleEndian(now[4..]) - BinaryPrimitives.ReadInt32LittleEndian(previous[4..]);
            dy.Encode(stream, medianY[m].Middle, d, only + ReturnTables.Even(dx.LastBits, 20));
            medianY[m].Add(d);
            d = BinaryPrimitives.ReadInt32LittleEndian(now[8..]);
            z.Encode(stream, lastZ[l], d, only + ReturnTables.Even((dx.LastBits + dy.LastBits) / 2, 18));
            lastZ[l] = d;
        }
    }
}
