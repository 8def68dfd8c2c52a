using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using SkiaSharp;

namespace CloudStruct.Products.Map;

/// <summary>Where places on the ground lie on the sheet.</summary>
/// <param name="Map">The map.</param>
/// <param name="Origin">Map coordinates of the local origin [m].</param>
/// <param name="Left">Left edge of the map [pt].</param>
/// <param name="Top">Upper edge [pt].</param>
/// <param name="PerM">Points for a metre.</param>
internal sealed record MapSheet(MapDrawing Map, Vec3 Origin, float Left, float Top, float PerM)
{
    public float Right => Left + ((float)(Map.RightM - Map.LeftM) * PerM);

    public float Bottom => Top + ((float)(Map.TopM - Map.BottomM) * PerM);

    /// <summary>A local place.</summary>
    public SKPoint At(Point2 p) => new(Left + ((float)(p.X - Map.LeftM) * PerM), Top + ((float)(Map.TopM - p.Y) * PerM));

    /// <summary>The sheet's part that the whole blocks of a raster cover.</summary>
    public SKRect Box(SurfaceRaster s, int block)
    {
        double east = s.Width / block * block * s.PixelM, south = s.Height / block * block * s.PixelM;
        SKPoint a = At(new Point2(s.LeftM, s.TopM)), b = At(new Point2(s.LeftM + east, s.TopM - south));
        return new SKRect(a.X, a.Y, b.X, b.Y);
    }

    /// <summary>Grid lines that run north, with room for their labels.</summary>
    public IEnumerable<(double Value, float X)> Eastings() =>
        Lines(Map.LeftM + Origin.X, Map.RightM + Origin.X).Select(v => (v, At(new Point2(v - Origin.X, 0)).X)).Where(l => l.X > Left + 14 && l.X < Right - 14);

    /// <summary>Grid lines that run east.</summary>
    public IEnumerable<(double Value, float Y)> Northings() =>
        Lines(Map.BottomM + Origin.Y, Map.TopM + Origin.Y).Select(v => (v, At(new Point2(0, v - Origin.Y)).Y)).Where(l => l.Y > Top + 14 && l.Y < Bottom - 14);

    private IEnumerable<double> Lines(double from, double to)
    {
        for (double k = Math.Ceiling(from / Map.GridM); k * Map.GridM <= to; k++) yield return k * Map.GridM;
    }
}
