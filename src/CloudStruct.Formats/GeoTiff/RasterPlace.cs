using CloudStruct.Records.Frame;

namespace CloudStruct.Formats.GeoTiff;

/// <summary>Size of a raster and its place on the map.</summary>
/// <param name="Width">Pixels in a row.</param>
/// <param name="Height">Rows.</param>
/// <param name="PixelM">Edge of a pixel [m].</param>
/// <param name="Left">Map x of the left edge of the first column [m].</param>
/// <param name="Top">Map y of the upper edge of the first row [m].</param>
/// <param name="Crs">The system; not named when it is not in metres.</param>
/// <param name="Date">Date of the input; none is written when it is not known.</param>
/// <param name="Description">What it shows, with the run.</param>
/// <param name="Software">Name and version of the writer.</param>
public sealed record RasterPlace(
    int Width, int Height, double PixelM, double Left, double Top, CrsInfo Crs, DateOnly? Date, string Description, string Software);
