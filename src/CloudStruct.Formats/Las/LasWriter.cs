using System.Buffers.Binary;
using CloudStruct.Records.Frame;
using static System.FormattableString;

namespace CloudStruct.Formats.Las;

/// <summary>Writes LAS 1.4 (point format 6 or 7) or LAS 1.2 (0 or 2) from columns, batch by batch.</summary>
/// <remarks>Counts and extremes are known at the end only: the header is written again on <see cref="Dispose"/>, so the
/// stream must allow seeking. The file holds no machine name and no date but that of the layout: same points, same bytes.
/// LAS 1.4 R16 (ASPRS) is the source of every offset.</remarks>
public sealed partial class LasWriter : IDisposable
{
    // Few large writes: about 30,000 points each.
    private const int BufferBytes = 1 << 20;

    private readonly Stream stream;
    private readonly bool ownsStream;
    private readonly LasLayout layout;
    private readonly int recordBytes;
    private readonly byte[] buffer;
    private readonly long start;
    private readonly long pointsAt;
    private int used;
    private long count;
    private int minX = int.MaxValue, minY = int.MaxValue, minZ = int.MaxValue;
    private int maxX = int.MinValue, maxY = int.MinValue, maxZ = int.MinValue;
    private bool disposed;

    /// <summary>Creates or replaces a file.</summary>
    public LasWriter(string path, LasLayout layout)
        : this(new FileStream(path, FileMode.Create, FileAccess.ReadWrite, FileShare.None, 1), layout, true)
    {
    }

    /// <summary>Writes into a seekable stream from its present position on.</summary>
    /// <param name="stream">Left open and positioned after the file on <see cref="Dispose"/>.</param>
    /// <param name="layout">What the file looks like.</param>
    public LasWriter(Stream stream, LasLayout layout)
        : this(stream, layout, false)
    {
    }

    private LasWriter(Stream stream, LasLayout layout, bool ownsStream)
    {
        if (layout.Minor is not (2 or 4)) throw new ArgumentException("only LAS 1.2 and 1.4 are written", nameof(layout));
        if (!(layout.Scale.X > 0 && layout.Scale.Y > 0 && layout.Scale.Z > 0))
            throw new ArgumentException("a scale must be above 0", nameof(layout));
        if (layout.Extras.Any(e => e.Bytes == 0)) throw new ArgumentException("an extra column needs a type", nameof(layout));
        this.stream = stream;
        this.ownsStream = ownsStream;
        this.layout = layout;
        start = stream.Position;
        recordBytes = LasRecord.MinimumBytes(layout.PointFormat) + layout.Extras.Sum(e => e.Bytes);
        buffer = new byte[Math.Max(BufferBytes / recordBytes, 1) * recordBytes];
        byte[][] records = VariableRecords(layout);
        pointsAt = HeaderBytes(layout) + records.Sum(r => (long)r.Length);
        stream.Write(Header(records.Length));
        foreach (byte[] record in records) stream.Write(record);
    }

    /// <summary>Points written so far.</summary>
    public long Count => count;

    /// <summary>Appends points.</summary>
    /// <exception cref="ArgumentException">A coordinate is not finite or out of reach of scale and offset, or a column is
    /// short or of another type than declared.</exception>
    public void Write(LasBatch batch)
    {
        ObjectDisposedException.ThrowIf(disposed, this);
        if (batch.Extra.Length != layout.Extras.Length)
            throw new ArgumentException(Invariant($"{layout.Extras.Length} extra columns declared, {batch.Extra.Length} given"));
        int perBuffer = buffer.Length / recordBytes;
        for (int from = 0; from < batch.Count;)
        {
            int n = Math.Min(batch.Count - from, perBuffer - (used / recordBytes));
            Pack(batch, from, n, buffer.AsSpan(used, n * recordBytes));
            used += n * recordBytes;
            count += n;
            from += n;
            if (used == buffer.Length) Flush();
        }
    }

    /// <summary>Completes the header and closes a file that the writer opened.</summary>
    public void Dispose()
    {
        if (disposed) return;
        disposed = true;
        Flush();
        long end = stream.Position;
        stream.Position = start;
        stream.Write(Header(VariableRecords(layout).Length));
        stream.Position = end;
        if (ownsStream) stream.Dispose();
    }

    private void Flush()
    {
        stream.Write(buffer, 0, used);
        used = 0;
    }

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
