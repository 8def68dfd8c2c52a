using CloudStruct.Formats.Laz;
using CloudStruct.Records.Frame;
using static System.FormattableString;

namespace CloudStruct.Formats.Las;

/// <summary>Writes LAS 1.4 (point format 6 or 7) or LAS 1.2 (0 or 2), plain or compressed, from columns, batch by batch.</summary>
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
    private readonly LazPacker? packer;
    private int used;
    private long count;
    private int minX = int.MaxValue, minY = int.MaxValue, minZ = int.MaxValue;
    private int maxX = int.MinValue, maxY = int.MinValue, maxZ = int.MinValue;
    private bool disposed;

    /// <summary>Creates or replaces a file.</summary>
    /// <param name="path">Where.</param>
    /// <param name="layout">What the file looks like.</param>
    /// <param name="threads">Chunks compressed at once, up to 16; 0 takes the cores of the machine. It changes no byte.</param>
    public LasWriter(string path, LasLayout layout, int threads = 0)
        : this(new FileStream(path, FileMode.Create, FileAccess.ReadWrite, FileShare.None, 1), layout, threads, true)
    {
    }

    /// <summary>Writes into a seekable stream from its present position on.</summary>
    /// <param name="stream">Left open and positioned after the file on <see cref="Dispose"/>.</param>
    /// <param name="layout">What the file looks like.</param>
    /// <param name="threads">Chunks compressed at once, up to 16; 0 takes the cores of the machine. It changes no byte.</param>
    public LasWriter(Stream stream, LasLayout layout, int threads = 0)
        : this(stream, layout, threads, false)
    {
    }

    private LasWriter(Stream stream, LasLayout layout, int threads, bool ownsStream)
    {
        if (layout.Minor is not (2 or 4)) throw new ArgumentException("only LAS 1.2 and 1.4 are written", nameof(layout));
        if (!(layout.Scale.X > 0 && layout.Scale.Y > 0 && layout.Scale.Z > 0))
            throw new ArgumentException("a scale must be above 0", nameof(layout));
        if (layout.Extras.Any(e => e.Bytes == 0)) throw new ArgumentException("an extra column needs a type", nameof(layout));
        this.stream = stream;
        this.ownsStream = ownsStream;
        this.layout = layout;
        start = stream.Position;
        recordBytes = RecordBytes(layout);
        byte[][] records = VariableRecords(layout);
        pointsAt = HeaderBytes(layout) + records.Sum(r => (long)r.Length);
        stream.Write(Header(records.Length));
        foreach (byte[] record in records) stream.Write(record);
        if (layout.Compressed)
        {
            packer = new LazPacker(stream, start, LazLayout.For(layout.PointFormat, recordBytes), threads > 0 ? threads : Environment.ProcessorCount);
            packer.Begin();
        }
        buffer = new byte[(packer?.Batch ?? Math.Max(BufferBytes / recordBytes, 1)) * recordBytes];
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
        packer?.Finish();
        long end = stream.Position;
        stream.Position = start;
        stream.Write(Header(VariableRecords(layout).Length));
        stream.Position = end;
        if (ownsStream) stream.Dispose();
    }

    private void Flush()
    {
        if (packer is null) stream.Write(buffer, 0, used);
        else packer.Write(buffer, used / recordBytes);
        used = 0;
    }

    private static int RecordBytes(LasLayout layout) => LasRecord.MinimumBytes(layout.PointFormat) + layout.Extras.Sum(e => e.Bytes);
}
