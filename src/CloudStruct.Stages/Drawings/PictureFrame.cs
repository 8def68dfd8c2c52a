using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Drawings;

/// <summary>How the cloud is looked at: three unit vectors, and the window on the plane of the picture.</summary>
internal sealed record PictureFrame
{
    // Finer pixels than this part of the spacing of the points show only the splats.
    private const double PixelsInSpacing = 4;

    // Outliers beyond these shares of the points do not widen the window.
    private const double Tail = 0.0005;

    /// <summary>Points right on the picture.</summary>
    public Vec3 Right { get; private init; }

    /// <summary>Points up on the picture.</summary>
    public Vec3 Up { get; private init; }

    /// <summary>Points from the picture to the eye.</summary>
    public Vec3 Toward { get; private init; }

    /// <summary>Left border [m along <see cref="Right"/>].</summary>
    public double Left { get; private init; }

    /// <summary>Upper border [m along <see cref="Up"/>].</summary>
    public double Top { get; private init; }

    /// <summary>Metres per pixel.</summary>
    public double PixelM { get; private init; }

    /// <summary>Pixels.</summary>
    public int Width { get; private init; }

    /// <summary>Pixels.</summary>
    public int Height { get; private init; }

    /// <summary>Fits the window around the cloud.</summary>
    /// <param name="cloud">At least one point.</param>
    /// <param name="right">Unit vector.</param>
    /// <param name="up">Unit vector square to it.</param>
    /// <param name="sizePx">Longer side.</param>
    public static PictureFrame Around(WorkingCloud cloud, Vec3 right, Vec3 up, int sizePx)
    {
        (double left, double rightmost) = Extent(cloud, right);
        (double bottom, double top) = Extent(cloud, up);
        double margin = Math.Max(0.02 * Math.Max(rightmost - left, top - bottom), Math.Max(1e-3, cloud.SpacingM));
        (left, rightmost, bottom, top) = (left - margin, rightmost + margin, bottom - margin, top + margin);
        double pixel = Math.Max(Math.Max(rightmost - left, top - bottom) / sizePx, cloud.SpacingM / PixelsInSpacing);
        return new PictureFrame
        {
            Right = right,
            Up = up,
            Toward = right.Cross(up),
            Left = left,
            Top = top,
            PixelM = pixel,
            Width = Math.Max(1, (int)Math.Ceiling((rightmost - left) / pixel)),
            Height = Math.Max(1, (int)Math.Ceiling((top - bottom) / pixel)),
        };
    }

    /// <summary>Straight from above with grid north up, on a raster whose edges lie at whole pixels of the map grid: rasters of
    /// neighbouring surveys of one pixel size then fit together.</summary>
    /// <param name="cloud">At least one point.</param>
    /// <param name="sizePx">Longer side, about.</param>
    public static PictureFrame OnGrid(WorkingCloud cloud, int sizePx)
    {
        PictureFrame free = Around(cloud, new Vec3(1, 0, 0), new Vec3(0, 1, 0), sizePx);
        double power = Math.Pow(10, Math.Floor(Math.Log10(free.PixelM)) - 1), pixel = Math.Ceiling((free.PixelM / power) - 1e-9) * power;
        Vec3 origin = cloud.Frame.Origin;
        double left = (Math.Floor((free.Left + origin.X) / pixel) * pixel) - origin.X;
        double top = (Math.Ceiling((free.Top + origin.Y) / pixel) * pixel) - origin.Y;
        return free with
        {
            Left = left,
            Top = top,
            PixelM = pixel,
            Width = (int)Math.Ceiling((free.Left + (free.Width * free.PixelM) - left) / pixel),
            Height = (int)Math.Ceiling((top - free.Top + (free.Height * free.PixelM)) / pixel),
        };
    }

    private static (double Low, double High) Extent(WorkingCloud cloud, Vec3 axis)
    {
        // A sample in equal steps of the grid's order: forty thousand points place the tails well enough.
        int step = Math.Max(1, cloud.Count / 40_000);
        double[] along = new double[(cloud.Count + step - 1) / step];
        for (int k = 0; k < along.Length; k++) along[k] = cloud.Place(k * step).Dot(axis);
        Array.Sort(along);
        int tail = (int)(Tail * along.Length);
        return (along[tail], along[^(tail + 1)]);
    }
}
