namespace CloudStruct.Tests.Products;

/// <summary>A temporary folder that is gone after the test.</summary>
internal sealed class Scratch : IDisposable
{
    public string Folder { get; } = Directory.CreateTempSubdirectory("products-").FullName;

    public string this[string name] => Path.Combine(Folder, name);

    public void Dispose() => Directory.Delete(Folder, recursive: true);
}
