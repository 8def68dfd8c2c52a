using CloudStruct.Products.Plots;
using CloudStruct.Records.Drawings;
using SkiaSharp;
using static System.FormattableString;

namespace CloudStruct.Products.Map;

/// <summary>Symbols of attitudes as the FGDC Digital Cartographic Standard for Geologic Map Symbolization (FGDC-STD-013-2006)
/// draws planar features: a bar along strike, a tick down dip with the dip beside it; for upright planes the tick crosses
/// the bar; for level planes a cross in a circle. Sizes are from memory of common practice.</summary>
internal static class MapSymbols
{
    private const float PerMm = 72 / 25.4f, HalfBar = 2.2f * PerMm, Tick = 1.3f * PerMm, FigureAt = 2.7f * PerMm, Ring = 1.1f * PerMm;

    private static readonly SKColor Halo = new(0xFF, 0xFF, 0xFF, 0xD2);

    /// <summary>Faces in the dike and on contacts: a dark vermillion of the palette; hosts in black.</summary>
    private static readonly SKColor OfDike = new(0x9C, 0x3F, 0x00);

    /// <summary>Draws one symbol.</summary>
    public static void Draw(Pen pen, MapSymbol symbol, SKPoint at)
    {
        bool contact = symbol.Domain == "contact";
        SKColor colour = symbol.Domain is "dike" or "margin" ? OfDike : Palette.Ink;
        float weight = contact ? 1.3f : 0.8f;
        foreach ((SKPoint[] line, bool isRing) in Strokes(symbol, at))
        {
            if (isRing) pen.Ring(at.X, at.Y, Ring, Halo, weight + 1.6f);
            else pen.Line(line, Halo, weight + 1.6f);
        }

        foreach ((SKPoint[] line, bool isRing) in Strokes(symbol, at))
        {
            if (isRing) pen.Ring(at.X, at.Y, Ring, colour, weight);
            else pen.Line(line, colour, weight);
        }

        if (symbol.Kind != "inclined") return;
        SKPoint figure = Turned(symbol, at, FigureAt, 0);
        pen.TextOnPicture(Invariant($"{symbol.DipDeg}"), figure.X, figure.Y + (Letters.Axis.Size * 0.36f), Letters.Axis, colour, Align.Middle);
    }

    private static IEnumerable<(SKPoint[] Line, bool IsRing)> Strokes(MapSymbol s, SKPoint at)
    {
        if (s.Kind == "horizontal")
        {
            yield return ([], true);
            yield return ([new(at.X - Ring, at.Y), new(at.X + Ring, at.Y)], false);
            yield return ([new(at.X, at.Y - Ring), new(at.X, at.Y + Ring)], false);
            yield break;
        }

        yield return ([Turned(s, at, 0, -HalfBar), Turned(s, at, 0, HalfBar)], false);
        yield return ([Turned(s, at, s.Kind == "vertical" ? -Tick : 0, 0), Turned(s, at, Tick, 0)], false);
    }

    // Down dip and along strike from the middle; the sheet's y runs down.
    private static SKPoint Turned(MapSymbol s, SKPoint at, float downDip, float along)
    {
        (float sin, float cos) = MathF.SinCos((float)s.RotationGridDeg * MathF.PI / 180);
        return new(at.X + (along * sin) + (downDip * cos), at.Y - (along * cos) + (downDip * sin));
    }
}
