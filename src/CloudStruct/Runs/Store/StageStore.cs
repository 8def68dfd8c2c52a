namespace CloudStruct.Runs.Store;

/// <summary>Stage results by content hash, in a folder that is capped and locked. Without a folder nothing is kept.</summary>
internal sealed class StageStore : IDisposable
{
    /// <summary>Most that the folder may hold [bytes]: forty surveys of some million points.</summary>
    public const long CapBytes = 20L << 30;

    private const string Ending = ".stage";
    private readonly string? folder;
    private readonly FileStream? held;
    private readonly bool readable;

    private StageStore(string? folder, FileStream? held, bool readable)
    {
        this.folder = folder;
        this.held = held;
        this.readable = readable;
    }

    /// <summary>Opens the folder; when another run holds it, or it cannot be written, this run keeps nothing.</summary>
    /// <param name="folder">The folder, made when missing; null when its disk is too full.</param>
    /// <param name="fresh">Nothing is read from it, results are still kept.</param>
    /// <param name="why">Why nothing is kept; null when all is well.</param>
    public static StageStore Open(string? folder, bool fresh, out string? why)
    {
        if (folder is null)
        {
            why = "the disk has too little room for them";
            return new StageStore(null, null, false);
        }

        try
        {
            Directory.CreateDirectory(folder);
            var held = new FileStream(Path.Combine(folder, "lock"), FileMode.OpenOrCreate, FileAccess.ReadWrite, FileShare.None);
            foreach (string left in Directory.GetFiles(folder, "*.part")) File.Delete(left);
            why = null;
            return new StageStore(folder, held, !fresh);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            why = e is UnauthorizedAccessException ? "its folder cannot be written" : "another run holds it";
            return new StageStore(null, null, false);
        }
    }

    /// <summary>The stored result of a key, or null.</summary>
    public Stored<T>? Find<T>(string stage, string key)
    {
        if (folder is null || !readable) return null;
        string path = PathOf(stage, key);
        if (!File.Exists(path)) return null;
        Stored<T>? found = RecordFile.Read<Stored<T>>(path);
        if (found is not null) File.SetLastWriteTimeUtc(path, DateTime.UtcNow);   // the cap drops what was not used longest
        return found;
    }

    /// <summary>Keeps a result; a full disk only means that it is not kept.</summary>
    public void Keep<T>(string stage, string key, Stored<T> result)
    {
        if (folder is null) return;
        string path = PathOf(stage, key), part = path + ".part";
        try
        {
            RecordFile.Write(part, result);
            File.Move(part, path, overwrite: true);
            Trim();
        }
        catch (IOException)
        {
            File.Delete(part);
        }
    }

    /// <inheritdoc/>
    public void Dispose() => held?.Dispose();

    private string PathOf(string stage, string key) => Path.Combine(folder!, $"{stage}-{key}{Ending}");

    private void Trim()
    {
        FileInfo[] files = [.. new DirectoryInfo(folder!).GetFiles("*" + Ending).OrderByDescending(f => f.LastWriteTimeUtc)];
        long sum = 0;
        foreach (FileInfo f in files)
        {
            sum += f.Length;
            if (sum > CapBytes) f.Delete();
        }
    }
}
