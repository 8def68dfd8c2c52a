using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;

namespace CloudStruct.Stages.Drawings;

/// <summary>The raster of the surface from above: colours, heights and light of the point that is seen at each pixel.</summary>
internal static class Surfaces
{
    // A surface steeper than this is not carried on from its point to the middle of the pixel: it would leave the rock.
    private const double FlattestNormal = 0.35;

    /// <summary>The raster.</summary>
    /// <param name="cloud">What was described.</param>
    /// <param name="frame">Looked at from straight above, grid north up.</param>
    /// <param name="seen">Point per pixel, -1 none.</param>
    /// <param name="light">Light per pixel, 0 to 1.</param>
    /// <param name="context">Threads.</param>
    public static SurfaceRaster Of(DescribedCloud cloud, PictureFrame frame, int[] seen, float[] light, StageContext context)
    {
        byte[] rgba = new byte[4 * seen.Length], lit = new byte[seen.Length];
        float[] height = new float[seen.Length];
        WorkingCloud c = cloud.Cloud;
        BlockParallel.For(seen.Length, context.Threads, context.Stop, (from, to) =>
        {
            for (int p = from; p < to; p++)
            {
                int i = seen[p];
                height[p] = float.NaN;
                if (i < 0) continue;
                lit[p] = (byte)((light[p] * 254) + 1);
                height[p] = HeightAt(cloud, frame, p, i);
                byte grey = (byte)(70 + (170 * light[p]));
                rgba[4 * p] = c.HasColour ? c.Red[i] : grey;
                rgba[(4 * p) + 1] = c.HasColour ? c.Green[i] : grey;
                rgba[(4 * p) + 2] = c.HasColour ? c.Blue[i] : grey;
                rgba[(4 * p) + 3] = 255;
            }
        });
        return new SurfaceRaster
        {
            Width = frame.Width,
            Height = frame.Height,
            PixelM = frame.PixelM,
            LeftM = frame.Left,
            TopM = frame.Top,
            HasColour = c.HasColour,
            Rgba = rgba,
            HeightM = height,
            Light = lit,
        };
    }

    // Along the surface at the point to the middle of the pixel: without this the heights step from disc to disc.
    private static float HeightAt(DescribedCloud cloud, PictureFrame frame, int pixel, int point)
    {
        Vec3 at = cloud.Cloud.Place(point);
        if (point >= cloud.NormalX.Length) return (float)at.Z;
        Vec3 n = cloud.Normal(point);
        if (!(Math.Abs(n.Z) > FlattestNormal)) return (float)at.Z;
        double dx = frame.Left + (((pixel % frame.Width) + 0.5) * frame.PixelM) - at.X;
        double dy = frame.Top - (((pixel / frame.Width) + 0.5) * frame.PixelM) - at.Y;
        double rise = -((n.X * dx) + (n.Y * dy)) / n.Z, most = cloud.Cloud.SpacingM;
        return (float)(at.Z + Math.Clamp(rise, -most, most));
    }
}
