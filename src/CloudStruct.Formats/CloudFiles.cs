using CloudStruct.Formats.Bytes;
using CloudStruct.Formats.Crs;
using CloudStruct.Formats.Gltf;
using CloudStruct.Formats.Las;
using CloudStruct.Formats.Meshes;
using CloudStruct.Formats.Ply;
using CloudStruct.Formats.Text;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using static System.FormattableString;

namespace CloudStruct.Formats;

/// <summary>The door for cloud files: what is in a file decides, its name only helps to say what is wrong.</summary>
public static class CloudFiles
{
    private const string Mend = "Export the cloud as LAS, LAZ or PLY and run again";

    private static readonly string[] CloudExtensions = [".las", ".laz", ".ply", ".glb", ".gltf", ".xyz"];

    /// <summary>Whether a file in a survey's clouds folder is meant as a cloud, by its extension in any case.</summary>
    public static bool IsCloudName(string name) =>
        CloudExtensions.Contains(Path.GetExtension(name), StringComparer.OrdinalIgnoreCase);

    /// <summary>A cloud that can be read; its header has been checked, no point has been read.</summary>
    /// <param name="path">The file.</param>
    /// <param name="sampling">How a mesh is sampled; null for the usual density.</param>
    /// <exception cref="InputException">The file cannot be measured: missing, of an unread format, cut short, damaged.</exception>
    public static IPointSource Open(string path, MeshSampling? sampling = null)
    {
        IPointSource source = Look(path, sampling ?? new MeshSampling(), out bool truncated);
        if (truncated) source.Read(CancellationToken.None);   // says what is missing
        return source;
    }

    /// <summary>What a file says of itself, and what is wrong with it; a file cut short is described too.</summary>
    /// <exception cref="InputException">Nothing can be said of the file: missing, of an unread format, header damaged.</exception>
    public static CloudHeader Inspect(string path) => Look(path, new MeshSampling(), out _).Header;

    private static IPointSource Look(string path, MeshSampling sampling, out bool truncated)
    {
        using var file = new FileBytes(path);
        Span<byte> start = stackalloc byte[16];
        start = start[..file.Read(0, start)];
        truncated = false;
        if (start.StartsWith("LASF"u8))
        {
            LasHeader las = LasHeaderReader.Read(file);
            truncated = las.IsTruncated;
            return new LasSource(path, las, Describe(las));
        }
        if (start.Length > 3 && start.StartsWith("ply"u8) && start[3] is (byte)'\n' or (byte)'\r' or (byte)' ')
            return new PlySource(path, file, sampling);
        if (start.StartsWith("glTF"u8) || Path.GetExtension(file.Name).ToLowerInvariant() is ".glb" or ".gltf") return new GltfSource(path, file.Length, sampling);
        if (Path.GetExtension(file.Name).ToLowerInvariant() is ".xyz" or ".txt" or ".csv" or ".asc" or ".pts" && file.Length > 0 && !IsPacked(start) && start.IndexOf((byte)0) < 0) return new TextSource(path, file);
        throw Refusal(file, start);
    }

    private static bool IsPacked(ReadOnlySpan<byte> start) => start.StartsWith("PK\u0003\u0004"u8) || start is [0x1F, 0x8B, ..];

    private static CloudHeader Describe(LasHeader las)
    {
        CrsFound crs = CrsReader.Read(las.Projection.SaysWkt, las.Projection.Wkt, las.Projection.KeyDirectory,
            las.Projection.KeyDoubles, las.Projection.KeyText);
        var problems = new List<string>(las.Problems);
        problems.AddRange(crs.Problems);
        bool laz = las.Name.EndsWith(".laz", StringComparison.OrdinalIgnoreCase), plain = las.Name.EndsWith(".las", StringComparison.OrdinalIgnoreCase);
        if (laz && las.Laz is null) problems.Add("It is named .laz though its points are not compressed.");
        else if (plain && las.Laz is not null) problems.Add("It is named .las though its points are compressed.");
        else if (!laz && !plain) problems.Add($"It is {(las.Laz is null ? "LAS" : "LAZ")} though its name says otherwise.");
        return new CloudHeader
        {
            Name = las.Name,
            Format = Invariant($"{(las.Laz is null ? "LAS" : "LAZ")} 1.{las.Minor}, point format {las.PointFormat}"),
            Bytes = las.FileBytes,
            Points = las.Present,
            HasColour = LasRecord.ColourOffset(las.PointFormat) >= 0,
            Min = las.Min,
            Max = las.Max,
            Crs = crs.Crs,
            Date = las.Date,
            Facts = las.Facts,
            Problems = [.. problems],
        };
    }

    private static InputException Refusal(FileBytes file, ReadOnlySpan<byte> start)
    {
        string extension = Path.GetExtension(file.Name).ToLowerInvariant();
        if (file.Length == 0)
            return new InputException(file.Name, "the file is empty", "0 bytes", "The copy failed; copy the file again");
        if (start.StartsWith("ASTM-E57"u8))
            return new InputException(file.Name, "E57 is not read by this version", "an E57 file", Mend);
        if (IsPacked(start))
            return new InputException(file.Name, "the file is a compressed archive", "the mark of a zip or gzip file", "Unpack it first, then give the cloud inside");
        if (start.IndexOfAnyExcept((byte)0) < 0)
            return new InputException(file.Name, "the file starts with zeros where its format should stand", Invariant($"{file.Length} bytes"),
                "The copy is incomplete; copy the file again");
        string claim = extension is ".las" or ".laz" or ".ply" ? Invariant($"it is named {extension}, but its content is something else") : "its format is not one that is read";
        return new InputException(Invariant($"{file.Name}, byte 0"), claim, "first bytes " + Convert.ToHexString(start[..Math.Min(8, start.Length)]), Mend);
    }
}
