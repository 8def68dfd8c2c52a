using CloudStruct.Simulate.Chance;

namespace CloudStruct.Simulate.Paint;

/// <summary>Light to 8-bit sRGB, as a camera stores it.</summary>
internal static class Film
{
    private const double Exposure = 1.55;

    /// <summary>Colour of a pixel, sensor noise included.</summary>
    public static (byte R, byte G, byte B) Expose((double R, double G, double B) light, ref Dice lot)
    {
        double noise = 1 + (0.02 * lot.Normal());
        return (Level(light.R * noise, ref lot), Level(light.G * noise, ref lot), Level(light.B * noise, ref lot));
    }

    /// <summary>sRGB transfer curve of IEC 61966-2-1 with a soft shoulder above, and half a level of sensor noise.</summary>
    private static byte Level(double linear, ref Dice lot)
    {
        double v = 1 - Math.Exp(-Exposure * linear);
        double s = v <= 0.0031308 ? 12.92 * v : (1.055 * Math.Pow(v, 1 / 2.4)) - 0.055;
        return (byte)Math.Clamp(Math.Round((255 * s) + (0.8 * lot.Normal())), 0, 255);
    }
}
