using CloudStruct.Formats;
using CloudStruct.Formats.Meshes;
using CloudStruct.Formats.Ply;
using CloudStruct.Records.Points;

namespace CloudStruct.Tests.Formats;

/// <summary>A file in the temporary folder for the length of a test, and all points of a file as plain arrays.</summary>
internal sealed class CloudFile : IDisposable
{
    private readonly string folder = Directory.CreateTempSubdirectory("cloud").FullName;

    public CloudFile(string name, byte[] bytes)
    {
        Path = System.IO.Path.Combine(folder, name);
        File.WriteAllBytes(Path, bytes);
    }

    public string Path { get; }

    public void Dispose() => Directory.Delete(folder, true);

    public CloudPoints Points() => Points(Path);

    public static CloudPoints Points(string path, MeshSampling? sampling = null, CancellationToken stop = default)
    {
        var p = new CloudPoints();
        foreach (SourceBlock block in CloudFiles.Open(path, sampling).Read(stop))
        {
            using (block)
            {
                p.X.AddRange(block.X.AsSpan(0, block.Count));
                p.Y.AddRange(block.Y.AsSpan(0, block.Count));
                p.Z.AddRange(block.Z.AsSpan(0, block.Count));
                p.Class.AddRange(block.Class.AsSpan(0, block.Count));
                p.Withheld += block.Withheld;
                if (!block.HasColour) continue;
                p.Red.AddRange(block.Red.AsSpan(0, block.Count));
                p.Green.AddRange(block.Green.AsSpan(0, block.Count));
                p.Blue.AddRange(block.Blue.AsSpan(0, block.Count));
            }
        }
        return p;
    }
}
