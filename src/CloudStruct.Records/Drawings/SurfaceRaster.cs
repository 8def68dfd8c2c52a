namespace CloudStruct.Records.Drawings;

/// <summary>The surface as seen straight from above on a regular raster, grid north up: picture, height and light.</summary>
/// <remarks>All columns are row-major from the upper left pixel. Where the cloud shows nothing the picture is transparent
/// and the height is NaN: holes are not filled.</remarks>
public sealed record SurfaceRaster
{
    /// <summary>Pixels in a row.</summary>
    public int Width { get; init; }

    /// <summary>Rows.</summary>
    public int Height { get; init; }

    /// <summary>Edge of a pixel [m].</summary>
    public double PixelM { get; init; }

    /// <summary>Left edge of the first column, local east [m].</summary>
    public double LeftM { get; init; }

    /// <summary>Upper edge of the first row, local north [m].</summary>
    public double TopM { get; init; }

    /// <summary>True when the colours are those of the cloud; false when it has none and the picture shows relief only.</summary>
    public bool HasColour { get; init; }

    /// <summary>Colours of the cloud without any shading, 4 bytes a pixel, alpha 0 or 255.</summary>
    public byte[] Rgba { get; init; } = [];

    /// <summary>Height of the highest surface, local [m].</summary>
    public float[] HeightM { get; init; } = [];

    /// <summary>Light from the upper left falling on the surface, 0 to 255; 0 where nothing was seen.</summary>
    public byte[] Light { get; init; } = [];
}
