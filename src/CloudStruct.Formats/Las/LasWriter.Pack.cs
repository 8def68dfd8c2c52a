using System.Buffers.Binary;
using static System.FormattableString;

namespace CloudStruct.Formats.Las;

public sealed partial class LasWriter
{
    private void Pack(LasBatch batch, int from, int n, Span<byte> to)
    {
        to.Clear();
        int[] whole = new int[n];
        Quantise(batch.X.Span.Slice(from, n), layout.Scale.X, layout.Offset.X, whole, ref minX, ref maxX, "x");
        PackInts(whole, to, 0);
        Quantise(batch.Y.Span.Slice(from, n), layout.Scale.Y, layout.Offset.Y, whole, ref minY, ref maxY, "y");
        PackInts(whole, to, 4);
        Quantise(batch.Z.Span.Slice(from, n), layout.Scale.Z, layout.Offset.Z, whole, ref minZ, ref maxZ, "z");
        PackInts(whole, to, 8);
        PackFlags(batch.Class, from, n, to);
        if (layout.HasColour && batch.Red.Length > 0)
        {
            int at = LasRecord.ColourOffset(layout.PointFormat);
            PackShorts(batch.Red.Span.Slice(from, n), to, at);
            PackShorts(batch.Green.Span.Slice(from, n), to, at + 2);
            PackShorts(batch.Blue.Span.Slice(from, n), to, at + 4);
        }
        int extraAt = LasRecord.MinimumBytes(layout.PointFormat);
        for (int c = 0; c < layout.Extras.Length; c++)
        {
            PackExtra(layout.Extras[c], batch.Extra[c], from, n, to, extraAt);
            extraAt += layout.Extras[c].Bytes;
        }
    }

    private static void Quantise(
        ReadOnlySpan<double> values, double scale, double offset, Span<int> whole, ref int min, ref int max, string axis)
    {
        for (int i = 0; i < values.Length; i++)
        {
            double steps = Math.Round((values[i] - offset) / scale);
            if (!(steps is >= int.MinValue and <= int.MaxValue))
                throw new ArgumentException(Invariant($"{axis} = {values[i]} cannot be stored with scale {scale} and offset {offset}"));
            int v = (int)steps;
            whole[i] = v;
            if (v < min) min = v;
            if (v > max) max = v;
        }
    }

    private void PackInts(ReadOnlySpan<int> values, Span<byte> to, int at)
    {
        for (int i = 0; i < values.Length; i++, at += recordBytes) BinaryPrimitives.WriteInt32LittleEndian(to[at..], values[i]);
    }

    private void PackShorts(ReadOnlySpan<ushort> values, Span<byte> to, int at)
    {
        for (int i = 0; i < values.Length; i++, at += recordBytes) BinaryPrimitives.WriteUInt16LittleEndian(to[at..], values[i]);
    }

    // One return of one: what a photogrammetric point is. Formats 0-5 keep both in 3 bits each, 6-10 in 4 bits each.
    private void PackFlags(ReadOnlyMemory<byte> classes, int from, int n, Span<byte> to)
    {
        bool wide = layout.PointFormat >= 6;
        byte returns = wide ? (byte)0x11 : (byte)0x09;
        int classAt = wide ? 16 : 15;
        ReadOnlySpan<byte> given = classes.Length > 0 ? classes.Span.Slice(from, n) : default;
        for (int i = 0, at = 0; i < n; i++, at += recordBytes)
        {
            to[at + 14] = returns;
            if (given.Length == 0) continue;
            if (!wide && given[i] > 31)
                throw new ArgumentException(Invariant($"class {given[i]} needs LAS 1.4: earlier point formats have 5 bits for it"));
            to[at + classAt] = given[i];
        }
    }

    private void PackExtra(LasExtra extra, Array values, int from, int n, Span<byte> to, int at)
    {
        Action<int, Span<byte>> put = (extra.Type, values) switch
        {
            (LasExtraType.UInt8, byte[] v) => (i, b) => b[0] = v[i],
            (LasExtraType.Int8, sbyte[] v) => (i, b) => b[0] = unchecked((byte)v[i]),
            (LasExtraType.UInt16, ushort[] v) => (i, b) => BinaryPrimitives.WriteUInt16LittleEndian(b, v[i]),
            (LasExtraType.Int16, short[] v) => (i, b) => BinaryPrimitives.WriteInt16LittleEndian(b, v[i]),
            (LasExtraType.UInt32, uint[] v) => (i, b) => BinaryPrimitives.WriteUInt32LittleEndian(b, v[i]),
            (LasExtraType.Int32, int[] v) => (i, b) => BinaryPrimitives.WriteInt32LittleEndian(b, v[i]),
            (LasExtraType.UInt64, ulong[] v) => (i, b) => BinaryPrimitives.WriteUInt64LittleEndian(b, v[i]),
            (LasExtraType.Int64, long[] v) => (i, b) => BinaryPrimitives.WriteInt64LittleEndian(b, v[i]),
            (LasExtraType.Float32, float[] v) => (i, b) => BinaryPrimitives.WriteSingleLittleEndian(b, v[i]),
            (LasExtraType.Float64, double[] v) => (i, b) => BinaryPrimitives.WriteDoubleLittleEndian(b, v[i]),
            _ => throw new ArgumentException(Invariant($"extra column {extra.Name} is declared as {extra.Type}, given as {values.GetType().Name}")),
        };
        for (int i = 0; i < n; i++, at += recordBytes) put(from + i, to[at..]);
    }
}
