namespace CloudStruct.Products;

/// <summary>The folder of results: makes its subfolders and keeps the list of what was written.</summary>
internal sealed class ResultFolder(string folder)
{
    private readonly List<string> written = [];

    /// <summary>Relative names with forward slashes, in the order of writing.</summary>
    public IReadOnlyList<string> Written => written;

    /// <summary>Creates a file for writing and reading, and notes it.</summary>
    /// <param name="name">Relative name with forward slashes: "tables/faces.csv".</param>
    public FileStream Create(string name) => new(Reserve(name), FileMode.Create, FileAccess.ReadWrite, FileShare.None);

    /// <summary>Notes a file that another writer makes, and gives its path.</summary>
    public string Reserve(string name)
    {
        string path = Path.Combine(folder, name);
        Directory.CreateDirectory(Path.GetDirectoryName(path)!);
        written.Add(name);
        return path;
    }

    /// <summary>Writes a whole file.</summary>
    public void Write(string name, ReadOnlySpan<byte> bytes)
    {
        using FileStream stream = Create(name);
        stream.Write(bytes);
    }
}
