using SkiaSharp;

namespace CloudStruct.Products.Report;

/// <summary>Pictures inside the page, each in the kind that takes least room there; the files beside the report stay as they are.</summary>
internal static class PagePicture
{
    private const int Quality = 86;   // lettering still has clean edges

    // Of the encoder, 0 to 100: more takes seconds for a few per cent.
    private const float Effort = 20;

    /// <summary>Address, within the page, of a picture of the cloud or of a map upon it: JPEG, where that is smaller.</summary>
    public static string OfPhotograph(byte[] png)
    {
        using SKBitmap picture = SKBitmap.Decode(png);
        using SKData jpeg = picture.Encode(SKEncodedImageFormat.Jpeg, Quality);
        return jpeg != null && jpeg.Size < png.Length ? Address("jpeg", jpeg.ToArray()) : Address("png", png);
    }

    /// <summary>Address of a line drawing: as SVG where that is smallest, else its pixels of 300 dpi without loss.</summary>
    public static string OfDrawing(byte[] svg, byte[] png)
    {
        using SKBitmap picture = SKBitmap.Decode(png);
        using SKPixmap pixels = picture.PeekPixels();
        using SKData? webp = pixels.Encode(new SKWebpEncoderOptions(SKWebpEncoderCompression.Lossless, Effort));
        byte[] small = webp != null && webp.Size < png.Length ? webp.ToArray() : png;
        return svg.Length <= small.Length ? Address("svg+xml", svg) : Address(small == png ? "png" : "webp", small);
    }

    private static string Address(string kind, byte[] bytes) => $"data:image/{kind};base64," + Convert.ToBase64String(bytes);
}
