using System.Numerics;
using System.Runtime.InteropServices;
using CloudStruct.Records.Complaints;
using SkiaSharp;

namespace CloudStruct.Formats.Gltf;

/// <summary>Colours of places on a model: texture, vertex colour and material together. One image is unpacked at a time.</summary>
/// <remarks>glTF 2.0: colours of vertices and materials are linear, those of textures sRGB; places in a texture repeat beyond 0 to 1.</remarks>
internal sealed class GltfPainter(string name, GltfPiece[] pieces)
{
    private int current;
    private int unpacked = -1;
    private byte[] pixels = [];
    private int width, height;

    /// <summary>Colour at a place of a triangle, 0-65535.</summary>
    public (ushort R, ushort G, ushort B) At(int triangle, double u, double v)
    {
        while (triangle < pieces[current].First) current--;
        while (triangle >= pieces[current].First + pieces[current].Triangles) current++;
        GltfPiece piece = pieces[current];
        int at = 3 * (triangle - piece.First), a = piece.Corners[at], b = piece.Corners[at + 1], c = piece.Corners[at + 2];
        float fu = (float)u, fv = (float)v, fw = 1 - fu - fv;
        Vector4 light = piece.Factor;
        if (piece.Colour.Length > 0) light *= (fw * piece.Colour[a]) + (fu * piece.Colour[b]) + (fv * piece.Colour[c]);
        if (piece.Texture.Length == 0 || piece.Image.IsEmpty) return (Level(light.X), Level(light.Y), Level(light.Z));
        Unpack(piece);
        Vector2 place = (fw * piece.Texture[a]) + (fu * piece.Texture[b]) + (fv * piece.Texture[c]);
        (double r, double g, double bl) = Texel(place);
        bool plain = light == Vector4.One;
        return plain ? (Byte(r), Byte(g), Byte(bl)) : (Level(Linear(r) * light.X), Level(Linear(g) * light.Y), Level(Linear(bl) * light.Z));
    }

    private void Unpack(GltfPiece piece)
    {
        if (unpacked == current) return;
        if (unpacked >= 0 && pieces[unpacked].Image.Equals(piece.Image))
        {
            unpacked = current;
            return;
        }

        using SKData data = SKData.CreateCopy(piece.Image.Span);
        using SKCodec? codec = SKCodec.Create(data);
        if (codec is null) throw Damaged(piece);
        var info = new SKImageInfo(codec.Info.Width, codec.Info.Height, SKColorType.Rgba8888, SKAlphaType.Unpremul);
        pixels = new byte[info.BytesSize];
        GCHandle pin = GCHandle.Alloc(pixels, GCHandleType.Pinned);
        try
        {
            if (codec.GetPixels(info, pin.AddrOfPinnedObject()) is not (SKCodecResult.Success or SKCodecResult.IncompleteInput)) throw Damaged(piece);
        }
        finally
        {
            pin.Free();
        }

        (width, height, unpacked) = (info.Width, info.Height, current);
    }

    private InputException Damaged(GltfPiece piece) => new(name, "a texture of the model cannot be unpacked", $"{piece.Image.Length} bytes", "Export the model again with JPEG or PNG textures");

    // Between the four pixels around the place; the middle of the first pixel is at half a pixel.
    private (double R, double G, double B) Texel(Vector2 place)
    {
        double x = ((place.X - Math.Floor(place.X)) * width) - 0.5, y = ((place.Y - Math.Floor(place.Y)) * height) - 0.5;
        if (!double.IsFinite(x) || !double.IsFinite(y)) return default;
        int x0 = (int)Math.Floor(x), y0 = (int)Math.Floor(y);
        double fx = x - x0, fy = y - y0, r = 0, g = 0, b = 0;
        for (int k = 0; k < 4; k++)
        {
            int px = (x0 + (k & 1) + width) % width, py = (y0 + (k >> 1) + height) % height, at = 4 * ((py * width) + px);
            double w = ((k & 1) == 0 ? 1 - fx : fx) * (k < 2 ? 1 - fy : fy);
            r += w * pixels[at];
            g += w * pixels[at + 1];
            b += w * pixels[at + 2];
        }

        return (r, g, b);
    }

    private static ushort Byte(double v) => (ushort)Math.Round(Math.Clamp(v, 0, 255) * 257);

    // IEC 61966-2-1.
    private static float Linear(double level)
    {
        double s = level / 255;
        return (float)(s <= 0.04045 ? s / 12.92 : Math.Pow((s + 0.055) / 1.055, 2.4));
    }

    /// <summary>Level 0-65535 of a linear value.</summary>
    public static ushort Level(float linear)
    {
        double v = Math.Clamp(linear, 0, 1), s = v <= 0.0031308 ? 12.92 * v : (1.055 * Math.Pow(v, 1 / 2.4)) - 0.055;
        return (ushort)Math.Round(65535 * s);
    }
}
