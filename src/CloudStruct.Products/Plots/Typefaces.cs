using System.Reflection.Metadata;
using System.Reflection.PortableExecutable;
using System.Text;
using SkiaSharp;

namespace CloudStruct.Products.Plots;

/// <summary>The two cuts of Inter (SIL Open Font License 1.1) in which all plots are lettered, on every machine alike.</summary>
/// <remarks>They come with the package Avalonia.Fonts.Inter, whose assembly is embedded in ours as plain data. It keeps
/// its files in one managed resource: length of the index, the index (version, count, then path, offset and size of each
/// file), the files.</remarks>
internal static class Typefaces
{
    private const string PackageResource = "Inter";
    private const string FontsResource = "!AvaloniaResources";

    private static readonly Lazy<SKTypeface> RegularCut = new(() => Load("/Assets/Inter-Regular.ttf"));
    private static readonly Lazy<SKTypeface> BoldCut = new(() => Load("/Assets/Inter-SemiBold.ttf"));

    /// <summary>For running text.</summary>
    public static SKTypeface Regular => RegularCut.Value;

    /// <summary>For titles.</summary>
    public static SKTypeface Bold => BoldCut.Value;

    private static SKTypeface Load(string path)
    {
        using Stream assembly = typeof(Typefaces).Assembly.GetManifestResourceStream(PackageResource)
            ?? throw new InvalidOperationException("the typeface is not embedded in this build");
        using var portable = new PEReader(assembly);
        BlobReader blob = Fonts(portable);
        int indexBytes = blob.ReadInt32(), dataAt = blob.Offset + indexBytes;
        int version = blob.ReadInt32(), count = blob.ReadInt32();
        if (version is not (1 or 2)) throw new InvalidOperationException($"the typeface package has an unknown index, version {version}");
        for (int i = 0; i < count; i++)
        {
            string name = Encoding.UTF8.GetString(blob.ReadBytes(blob.ReadCompressedInteger()));
            int offset = blob.ReadInt32(), size = blob.ReadInt32();
            if (name != path) continue;
            blob.Offset = dataAt + offset;
            using SKData data = SKData.CreateCopy(blob.ReadBytes(size));
            return SKTypeface.FromData(data) ?? throw new InvalidOperationException($"{path} cannot be read as a typeface");
        }
        throw new InvalidOperationException($"the typeface package holds no {path}");
    }

    // A reader that starts at the first byte of the resource.
    private static BlobReader Fonts(PEReader portable)
    {
        MetadataReader metadata = portable.GetMetadataReader();
        ManifestResource resource = metadata.ManifestResources.Select(metadata.GetManifestResource)
            .Single(r => metadata.GetString(r.Name) == FontsResource);
        DirectoryEntry directory = portable.PEHeaders.CorHeader!.ResourcesDirectory;
        BlobReader all = portable.GetSectionData(directory.RelativeVirtualAddress).GetReader();
        all.Offset = checked((int)resource.Offset);
        int length = all.ReadInt32();
        return portable.GetSectionData(directory.RelativeVirtualAddress + all.Offset).GetReader(0, length);
    }
}
