using System.Buffers.Binary;

namespace CloudStruct.Formats.Laz;

/// <summary>The 30 bytes common to point formats 6 to 10: nine layers, a state for each scanner channel.</summary>
internal sealed partial class Point14
{
    /// <summary>Size of the piece.</summary>
    public const int Bytes = 30;

    /// <summary>Layers: channel, returns and place; height; class; flags; intensity; angle; user; source; time.</summary>
    public const int LayerCount = 9;

    private readonly PointChannel?[] channels = new PointChannel?[4];
    private readonly ArithmeticDecoder?[] layers;
    private int current;

    /// <summary>Starts with the raw record of a chunk.</summary>
    /// <param name="raw">The record.</param>
    /// <param name="layers">Nine streams; null for one that is empty or not wanted: its field keeps the value of the raw record.</param>
    public Point14(ReadOnlySpan<byte> raw, ArithmeticDecoder?[] layers)
    {
        this.layers = layers;
        current = ChannelOf(raw);
        channels[current] = new PointChannel(raw);
    }

    /// <summary>Scanner channel of a record.</summary>
    public static int ChannelOf(ReadOnlySpan<byte> record) => (record[15] >> 4) & 3;

    /// <summary>Decodes the next record.</summary>
    /// <returns>Its scanner channel, and whether that is another than before.</returns>
    public (int Channel, bool Changed) Next(Span<byte> to)
    {
        unchecked
        {
            ArithmeticDecoder place = layers[0]!;
            PointChannel c = channels[current]!;
            int r0 = c.Last[14] & 15, n0 = c.Last[14] >> 4;
            int context = (r0 == 1 ? 1 : 0) + (r0 >= n0 ? 2 : 0) + (c.TimeChanged ? 4 : 0);
            int ch = place.Symbol(c.Changed[context] ??= new SymbolModel(128));
            bool moved = (ch & 64) != 0;
            if (moved)
            {
                int other = (current + 1 + place.Symbol(c.Channel)) & 3;
                c = channels[other] ??= new PointChannel(c.Last);
                current = other;
                c.Last[15] = (byte)((c.Last[15] & ~0x30) | (other << 4));
            }

            bool timeChanged = (ch & 16) != 0;
            byte[] q = c.Last;
            int rq = q[14] & 15, nq = q[14] >> 4;
            int n = (ch & 4) != 0 ? place.Symbol(c.Returns[nq] ??= new SymbolModel(16)) : nq;
            int r = (ch & 3) switch
            {
                0 => rq,
                1 => (rq + 1) & 15,
                2 => (rq + 15) & 15,
                _ => timeChanged ? place.Symbol(c.ReturnNumber[rq] ??= new SymbolModel(16)) : (rq + 2 + place.Symbol(c.ReturnSameTime)) & 15,
            };
            int map = ReturnTables.WideMap(n, r), level = ReturnTables.WideLevel(n, r), kind = (r == 1 ? 2 : 0) + (r >= n ? 1 : 0), g = timeChanged ? 1 : 0, only = n == 1 ? 1 : 0;
            ref RunningMedian mx = ref c.MedianX[(2 * map) + g], my = ref c.MedianY[(2 * map) + g];
            int d = c.X.Decode(place, mx.Middle, only);
            mx.Add(d);
            BinaryPrimitives.WriteInt32LittleEndian(q, BinaryPrimitives.ReadInt32LittleEndian(q) + d);
            int bits = c.X.LastBits;
            d = c.Y.Decode(place, my.Middle, only + ReturnTables.Even(bits, 20));
            my.Add(d);
            BinaryPrimitives.WriteInt32LittleEndian(q.AsSpan(4), BinaryPrimitives.ReadInt32LittleEndian(q.AsSpan(4)) + d);
            q[14] = (byte)(r | (n << 4));
            if (layers[1] is { } height)
            {
                c.LastZ[level] = c.Z.Decode(height, c.LastZ[level], only + ReturnTables.Even((bits + c.Y.LastBits) / 2, 18));
                BinaryPrimitives.WriteInt32LittleEndian(q.AsSpan(8), c.LastZ[level]);
            }

            Rest(c, q, ch, kind, g);
            c.TimeChanged = timeChanged;
            q.CopyTo(to);
            return (current, moved);
        }
    }

    private void Rest(PointChannel c, byte[] q, int ch, int kind, int g)
    {
        unchecked
        {
            if (layers[2] is { } classes) q[16] = (byte)classes.Symbol(c.Classification[((q[16] & 31) << 1) + (kind == 3 ? 1 : 0)] ??= new SymbolModel(256));
            if (layers[3] is { } flags)
            {
                int f = flags.Symbol(c.Flags[(q[15] & 15) | ((q[15] >> 6) << 4)] ??= new SymbolModel(64));
                q[15] = (byte)((q[15] & 0x30) | (f & 15) | ((f >> 4) << 6));
            }

            if (layers[4] is { } intensity)
            {
                int i = (2 * kind) + g;
                c.LastIntensity[i] = (ushort)c.Intensity.Decode(intensity, c.LastIntensity[i], kind);
                BinaryPrimitives.WriteUInt16LittleEndian(q.AsSpan(12), c.LastIntensity[i]);
            }

            if ((ch & 8) != 0 && layers[5] is { } angle)
                BinaryPrimitives.WriteUInt16LittleEndian(q.AsSpan(18), (ushort)c.Angle.Decode(angle, BinaryPrimitives.ReadInt16LittleEndian(q.AsSpan(18)), g));
            if (layers[6] is { } user) q[17] = (byte)user.Symbol(c.User[q[17] >> 2] ??= new SymbolModel(256));
            if ((ch & 32) != 0 && layers[7] is { } source)
                BinaryPrimitives.WriteUInt16LittleEndian(q.AsSpan(20), (ushort)c.Source.Decode(source, BinaryPrimitives.ReadUInt16LittleEndian(q.AsSpan(20)), 0));
            if ((ch & 16) != 0 && layers[8] is { } time) BinaryPrimitives.WriteInt64LittleEndian(q.AsSpan(22), c.Times.Next(time));
        }
    }
}
