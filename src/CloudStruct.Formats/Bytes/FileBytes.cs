using CloudStruct.Records.Complaints;
using Microsoft.Win32.SafeHandles;
using static System.FormattableString;

namespace CloudStruct.Formats.Bytes;

/// <summary>Bytes of a file by place, with every length that a file states checked against its real size first.</summary>
internal sealed class FileBytes : IDisposable
{
    private readonly SafeFileHandle handle;

    /// <summary>Opens a file for reading.</summary>
    /// <exception cref="InputException">It is missing, a folder, or may not be read.</exception>
    public FileBytes(string path)
    {
        Name = Path.GetFileName(path);
        try
        {
            handle = File.OpenHandle(path, FileMode.Open, FileAccess.Read, FileShare.Read, FileOptions.SequentialScan);
            Length = RandomAccess.GetLength(handle);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException or NotSupportedException or ArgumentException)
        {
            handle?.Dispose();
            throw Unreadable(path, e);
        }
    }

    /// <summary>File name without folders.</summary>
    public string Name { get; }

    /// <summary>Size [bytes] when it was opened.</summary>
    public long Length { get; }

    /// <summary>Fills a span from a place on; fewer bytes only at the end of the file.</summary>
    /// <returns>Bytes read.</returns>
    public int Read(long at, Span<byte> to)
    {
        int done = 0;
        try
        {
            while (done < to.Length)
            {
                int n = RandomAccess.Read(handle, to[done..], at + done);
                if (n == 0) break;
                done += n;
            }
        }
        catch (IOException e)
        {
            throw new InputException(Invariant($"{Name}, byte {at + done}"), "the file cannot be read further", e.Message,
                "Copy it again from its source", e);
        }
        return done;
    }

    /// <summary>Exactly this run of bytes as a new array.</summary>
    /// <param name="at">First byte.</param>
    /// <param name="count">Bytes, as stated by the file.</param>
    /// <param name="what">What the bytes are, for the message.</param>
    /// <exception cref="InputException">The file is shorter; nothing has been allocated then.</exception>
    public byte[] Take(long at, long count, string what)
    {
        if (at < 0 || count < 0 || at > Length || count > Length - at)
            throw new InputException(Invariant($"{Name}, byte {at}"), Invariant($"{what} reaches past the end of the file"),
                Invariant($"{count} bytes wanted, the file has {Length} in all"), "The copy is incomplete or damaged; copy it again and compare sizes");
        byte[] bytes = new byte[count];
        if (Read(at, bytes) < count)
            throw new InputException(Invariant($"{Name}, byte {at}"), "the file became shorter while it was read",
                Invariant($"{Length} bytes when opened"), "Wait until it is fully written, then run again");
        return bytes;
    }

    /// <inheritdoc/>
    public void Dispose() => handle.Dispose();

    private InputException Unreadable(string path, Exception e)
    {
        if (Directory.Exists(path))
            return new InputException(Name, "a file was expected", "a folder", "Name a cloud file", e);
        if (e is FileNotFoundException or DirectoryNotFoundException)
            return new InputException(Name, "there is no such file", "nothing at that place", "Check the name", e);
        return new InputException(Name, "the file cannot be opened", e is UnauthorizedAccessException ? "no permission to read it" : "the system refuses it",
            "Check its permissions and that no other program holds it", e);
    }
}
