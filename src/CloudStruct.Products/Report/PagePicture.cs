using SkiaSharp;

namespace CloudStruct.Products.Report;

/// <summary>Pictures of the cloud inside the page: a photograph is a fifth as large as JPEG, and the files beside the report stay as they are.</summary>
internal static class PagePicture
{
    private const int Quality = 86;   // lettering still has clean edges

    /// <summary>Address of the picture within the page: whichever of PNG and JPEG is smaller.</summary>
    public static string Address(byte[] png)
    {
        using SKBitmap picture = SKBitmap.Decode(png);
        using SKData jpeg = picture.Encode(SKEncodedImageFormat.Jpeg, Quality);
        return jpeg != null && jpeg.Size < png.Length
            ? "data:image/jpeg;base64," + Convert.ToBase64String(jpeg.AsSpan())
            : "data:image/png;base64," + Convert.ToBase64String(png);
    }
}
