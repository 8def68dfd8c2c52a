using System.Buffers.Binary;

namespace CloudStruct.Formats.Laz;

internal sealed partial class Point14
{
    // Bytes of the record and their bits that each layer holds; the first two layers are always written.
    private static readonly (int At, int Count, int Mask)[] Held = [(0, 0, 0), (0, 0, 0), (16, 1, 255), (15, 1, 0xCF), (12, 2, 255), (18, 2, 255), (17, 1, 255), (20, 2, 255), (22, 8, 255)];

    private readonly ArithmeticEncoder?[] written = [];

    /// <summary>Starts a chunk that is written.</summary>
    /// <param name="raw">Its first record.</param>
    /// <param name="written">Nine streams; null for a layer that is left out because all records are like the raw one.</param>
    public Point14(ReadOnlySpan<byte> raw, ArithmeticEncoder?[] written)
        : this(raw, Array.Empty<ArithmeticDecoder?>())
    {
        this.written = written;
    }

    /// <summary>Whether a layer must be written.</summary>
    public static bool Needs(int layer, ReadOnlySpan<byte> records, int recordBytes)
    {
        (int at, int count, int mask) = Held[layer];
        return layer < 2 || LayerNeed.Differs(records, recordBytes, at, count, mask) || (layer == 8 && records.Length > recordBytes && IsNoTime(records));
    }

    /// <summary>Encodes the next record.</summary>
    /// <returns>Its scanner channel, and whether that is another than before.</returns>
    public (int Channel, bool Changed) Put(ReadOnlySpan<byte> now)
    {
        unchecked
        {
            ArithmeticEncoder place = written[0]!;
            PointChannel before = channels[current]!, c = before;
            int r0 = c.Last[14] & 15, n0 = c.Last[14] >> 4, channel = ChannelOf(now);
            bool moved = channel != current;
            if (moved) c = channels[channel] ??= new PointChannel(c.Last);
            byte[] q = c.Last;
            int rq = q[14] & 15, nq = q[14] >> 4, r = now[14] & 15, n = now[14] >> 4;
            bool timeChanged = IsNoTime(now) || BinaryPrimitives.ReadInt64LittleEndian(now[22..]) != BinaryPrimitives.ReadInt64LittleEndian(q.AsSpan(22));
            int step = ((r - rq) & 15) switch { 0 => 0, 1 => 1, 15 => 2, _ => 3 };
            int ch = step | (n != nq ? 4 : 0) | (Short(now, 18) != Short(q, 18) ? 8 : 0) | (timeChanged ? 16 : 0) | (Short(now, 20) != Short(q, 20) ? 32 : 0) | (moved ? 64 : 0);

            int context = (r0 == 1 ? 1 : 0) + (r0 >= n0 ? 2 : 0) + (before.TimeChanged ? 4 : 0);
            place.Symbol(before.Changed[context] ??= new SymbolModel(128), ch);
            if (moved) place.Symbol(before.Channel, (channel - current - 1) & 3);
            current = channel;
            if (n != nq) place.Symbol(c.Returns[nq] ??= new SymbolModel(16), n);
            if (step == 3 && timeChanged) place.Symbol(c.ReturnNumber[rq] ??= new SymbolModel(16), r);
            else if (step == 3) place.Symbol(c.ReturnSameTime, (r - rq - 2) & 15);

            int map = ReturnTables.WideMap(n, r), level = ReturnTables.WideLevel(n, r), kind = (r == 1 ? 2 : 0) + (r >= n ? 1 : 0), g = timeChanged ? 1 : 0, only = n == 1 ? 1 : 0;
            ref RunningMedian mx = ref c.MedianX[(2 * map) + g], my = ref c.MedianY[(2 * map) + g];
            int d = BinaryPrimitives.ReadInt32LittleEndian(now) - BinaryPrimitives.ReadInt32LittleEndian(q);
            c.X.Encode(place, mx.Middle, d, only);
            mx.Add(d);
            d = BinaryPrimitives.ReadInt32LittleEndian(now[4..]) - BinaryPrimitives.ReadInt32LittleEndian(q.AsSpan(4));
            c.Y.Encode(place, my.Middle, d, only + ReturnTables.Even(c.X.LastBits, 20));
            my.Add(d);
            d = BinaryPrimitives.ReadInt32LittleEndian(now[8..]);
            c.Z.Encode(written[1]!, c.LastZ[level], d, only + ReturnTables.Even((c.X.LastBits + c.Y.LastBits) / 2, 18));
            c.LastZ[level] = d;
            PutRest(c, now, ch, kind, g);
            c.TimeChanged = timeChanged;
            now[..Bytes].CopyTo(q);
            return (channel, moved);
        }
    }

    // The reference encoder compares times as numbers, so that one that is none always counts as changed; files are to be the same to
    // the byte. It also takes -0.0 for 0.0 and loses the sign: times are otherwise compared by their bits here.
    private static bool IsNoTime(ReadOnlySpan<byte> record) => double.IsNaN(BinaryPrimitives.ReadDoubleLittleEndian(record[22..]));

    private static ushort Short(ReadOnlySpan<byte> record, int at) => BinaryPrimitives.ReadUInt16LittleEndian(record[at..]);

    // Class flags, direction and edge of a flight line without the channel between them.
    private static int FlagsOf(byte b) => (b & 15) | ((b >> 6) << 4);

    private void PutRest(PointChannel c, ReadOnlySpan<byte> now, int ch, int kind, int g)
    {
        byte[] q = c.Last;
        if (written[2] is { } classes) classes.Symbol(c.Classification[((q[16] & 31) << 1) + (kind == 3 ? 1 : 0)] ??= new SymbolModel(256), now[16]);
        if (written[3] is { } flags) flags.Symbol(c.Flags[FlagsOf(q[15])] ??= new SymbolModel(64), FlagsOf(now[15]));
        if (written[4] is { } intensity)
        {
            int i = (2 * kind) + g;
            ushort strength = Short(now, 12);
            c.Intensity.Encode(intensity, c.LastIntensity[i], strength, kind);
            c.LastIntensity[i] = strength;
        }

        if ((ch & 8) != 0) c.Angle.Encode(written[5]!, unchecked((short)Short(q, 18)), unchecked((short)Short(now, 18)), g);
        if (written[6] is { } user) user.Symbol(c.User[q[17] >> 2] ??= new SymbolModel(256), now[17]);
        if ((ch & 32) != 0) c.Source.Encode(written[7]!, Short(q, 20), Short(now, 20), 0);
        if ((ch & 16) != 0) c.Times.Put(written[8]!, BinaryPrimitives.ReadInt64LittleEndian(now[22..]));
    }
}
