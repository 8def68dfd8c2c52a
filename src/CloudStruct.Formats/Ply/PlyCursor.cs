using CloudStruct.Formats.Bytes;

namespace CloudStruct.Formats.Ply;

/// <summary>Values of a PLY file one after the other, whatever their encoding, through a buffer of fixed size.</summary>
internal abstract class PlyCursor
{
    private const int BufferBytes = 1 << 18;

    private readonly FileBytes file;
    private readonly byte[] buffer;
    private long nextAt;
    private int used;
    private int filled;

    /// <summary>A cursor at the first byte after the header.</summary>
    protected PlyCursor(FileBytes file, PlyHeader header)
    {
        this.file = file;
        Header = header;
        nextAt = header.DataAt;
        buffer = new byte[Math.Max(64, Math.Min(BufferBytes, header.FileBytes - header.DataAt))];
    }

    /// <summary>The file's header.</summary>
    protected PlyHeader Header { get; }

    /// <summary>Place of the next byte in the file.</summary>
    public long At => nextAt - (filled - used);

    /// <summary>Bytes not yet taken.</summary>
    protected long Left => Header.FileBytes - At;

    /// <summary>A cursor for the encoding of a header.</summary>
    public static PlyCursor Over(FileBytes file, PlyHeader header) =>
        header.Encoding == PlyEncoding.Ascii ? new PlyAsciiCursor(file, header) : new PlyBinaryCursor(file, header);

    /// <summary>Starts a record: in ascii, blank lines are passed.</summary>
    public abstract void StartRecord(PlyElement element);

    /// <summary>Next value of the record.</summary>
    public abstract double Value(PlyType type);

    /// <summary>Next whole number of the record, as it stands in a list length or an index.</summary>
    public abstract long Whole(PlyType type);

    /// <summary>Ends a record: in ascii, the line must end.</summary>
    public abstract void EndRecord();

    /// <summary>Passes values unread.</summary>
    public abstract void Skip(PlyType type, long count);

    /// <summary>Checks a list length against what is left of the file.</summary>
    public abstract void CheckList(PlyType type, long count);

    /// <summary>Passes a whole element.</summary>
    public virtual void SkipElement(PlyElement element, CancellationToken stop)
    {
        for (long i = 0; i < element.Count; i++)
        {
            if ((i & 0xFFFF) == 0) stop.ThrowIfCancellationRequested();
            StartRecord(element);
            foreach (PlyProperty p in element.Properties) SkipProperty(p);
            EndRecord();
        }
    }

    /// <summary>Passes one property of a record.</summary>
    public void SkipProperty(PlyProperty property)
    {
        long n = property.CountType is PlyType count ? ListLength(property, count) : 1;
        Skip(property.Type, n);
    }

    /// <summary>Length of the list that starts here.</summary>
    public long ListLength(PlyProperty property, PlyType countType)
    {
        long n = Whole(countType);
        CheckList(property.Type, n);
        return n;
    }

    /// <summary>At least so many bytes at the front of the buffer unless the file ends before; may be called with up to 64.</summary>
    protected ReadOnlySpan<byte> Peek(int bytes)
    {
        if (filled - used < bytes && nextAt < Header.FileBytes) Refill();
        return buffer.AsSpan(used, filled - used);
    }

    /// <summary>Takes bytes that <see cref="Peek"/> has shown.</summary>
    protected void Advance(int bytes) => used += bytes;

    /// <summary>Moves on by any number of bytes within the file.</summary>
    protected void Jump(long bytes)
    {
        if (bytes <= filled - used)
        {
            used += (int)bytes;
            return;
        }
        nextAt = At + bytes;
        used = filled = 0;
    }

    /// <summary>Copies the next bytes; large runs go straight from the file to their destination.</summary>
    /// <returns>Bytes copied: fewer only at the end of the file.</returns>
    public int Copy(Span<byte> to)
    {
        int front = Math.Min(filled - used, to.Length);
        buffer.AsSpan(used, front).CopyTo(to);
        used += front;
        if (front == to.Length) return front;
        int n = file.Read(nextAt, to[front..]);
        nextAt += n;
        return front + n;
    }

    private void Refill()
    {
        int kept = filled - used;
        buffer.AsSpan(used, kept).CopyTo(buffer);
        used = 0;
        int n = file.Read(nextAt, buffer.AsSpan(kept));
        nextAt += n;
        filled = kept + n;
        if (n == 0) nextAt = Header.FileBytes;   // the file shrank: its end is here
    }
}
