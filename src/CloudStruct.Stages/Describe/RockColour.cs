using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;

namespace CloudStruct.Stages.Describe;

/// <summary>Colour of each point as CIE L*a*b* and as ratios of linear light, which a shadow hardly moves.</summary>
/// <remarks>sRGB decoding and primaries by IEC 61966-2-1, white D65 (2 degree observer), L*a*b* by CIE 15; constants from
/// memory, checked against independent values in the tests.</remarks>
public static class RockColour
{
    /// <summary>White point X, of Y = 1.</summary>
    private const double WhiteX = 0.95047;

    /// <summary>White point Z, of Y = 1.</summary>
    private const double WhiteZ = 1.08883;

    // Below this code value a channel is mostly noise and stray light of the sky; at 254 or 255 it may be clipped.
    private const byte Darkest = 10;
    private const byte Clipped = 254;

    private static readonly float[] LinearOfCode = [.. Enumerable.Range(0, 256).Select(code => (float)Linear(code / 255.0))];

    /// <summary>Linear light of an encoded sRGB value, both 0 to 1.</summary>
    public static double Linear(double encoded) =>
        encoded <= 0.04045 ? encoded / 12.92 : Math.Pow((encoded + 0.055) / 1.055, 2.4);

    /// <summary>CIE L*a*b* (D65) of an 8-bit sRGB colour.</summary>
    public static (double L, double A, double B) Lab(byte red, byte green, byte blue)
    {
        double r = LinearOfCode[red], g = LinearOfCode[green], b = LinearOfCode[blue];
        double x = ((0.4124564 * r) + (0.3575761 * g) + (0.1804375 * b)) / WhiteX;
        double y = (0.2126729 * r) + (0.7151522 * g) + (0.0721750 * b);
        double z = ((0.0193339 * r) + (0.1191920 * g) + (0.9503041 * b)) / WhiteZ;
        double fx = Root(x), fy = Root(y), fz = Root(z);
        return ((116 * fy) - 16, 500 * (fx - fy), 200 * (fy - fz));
    }

    /// <summary>Whether all channels carry colour: none nearly black, none clipped.</summary>
    public static bool IsSound(byte red, byte green, byte blue) =>
        Math.Min(red, Math.Min(green, blue)) >= Darkest && Math.Max(red, Math.Max(green, blue)) < Clipped;

    /// <summary>ln(R/G) and ln(B/G) of linear light. Channels below code 10 are taken as 10, so that black gives 0 and not noise.</summary>
    public static (float RedGreen, float BlueGreen) LogRatios(byte red, byte green, byte blue)
    {
        float g = LinearOfCode[Math.Max(green, Darkest)];
        return (MathF.Log(LinearOfCode[Math.Max(red, Darkest)] / g), MathF.Log(LinearOfCode[Math.Max(blue, Darkest)] / g));
    }

    /// <summary>Fills the colour columns; a point whose own channels are black or clipped takes the mean ratios of its
    /// sound neighbours, if it has any.</summary>
    internal static DescribedCloud Describe(DescribedCloud described, StageContext context)
    {
        WorkingCloud cloud = described.Cloud;
        if (!cloud.HasColour) return described;
        int n = cloud.Count;
        float[] lStar = new float[n], aStar = new float[n], bStar = new float[n], redGreen = new float[n], blueGreen = new float[n];
        BlockParallel.For(
            n,
            context.Threads,
            context.Stop,
            (from, to) =>
            {
                for (int i = from; i < to; i++)
                {
                    (double l, double a, double b) = Lab(cloud.Red[i], cloud.Green[i], cloud.Blue[i]);
                    (lStar[i], aStar[i], bStar[i]) = ((float)l, (float)a, (float)b);
                    (redGreen[i], blueGreen[i]) = Ratios(cloud, i);
                }
            });
        return described with { LStar = lStar, AStar = aStar, BStar = bStar, LogRedGreen = redGreen, LogBlueGreen = blueGreen };
    }

    private static (float RedGreen, float BlueGreen) Ratios(WorkingCloud cloud, int i)
    {
        (byte[] red, byte[] green, byte[] blue) = (cloud.Red, cloud.Green, cloud.Blue);
        if (IsSound(red[i], green[i], blue[i])) return LogRatios(red[i], green[i], blue[i]);
        float sumRed = 0, sumBlue = 0;
        int sound = 0;
        foreach (int j in cloud.Neighbours.AsSpan(i * WorkingCloud.K, WorkingCloud.K))
        {
            if (j < 0) break;
            if (!IsSound(red[j], green[j], blue[j])) continue;
            (float rg, float bg) = LogRatios(red[j], green[j], blue[j]);
            sumRed += rg;
            sumBlue += bg;
            sound++;
        }

        return sound > 0 ? (sumRed / sound, sumBlue / sound) : LogRatios(red[i], green[i], blue[i]);
    }

    private static double Root(double t) => t > 216.0 / 24389 ? Math.Cbrt(t) : ((24389.0 / 27 * t) + 16) / 116;
}
