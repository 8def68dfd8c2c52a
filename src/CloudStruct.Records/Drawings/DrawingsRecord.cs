namespace CloudStruct.Records.Drawings;

/// <summary>What the stage drawings gives: all that sheets need computed.</summary>
public sealed record DrawingsRecord
{
    /// <summary>Nets: one per domain with faces, one for contacts.</summary>
    public NetDrawing[] Nets { get; init; } = [];

    /// <summary>Several nets on a sheet: dike against host, every set by itself.</summary>
    public NetSheet[] NetSheets { get; init; } = [];

    /// <summary>Roses of strikes, one per domain with enough faces.</summary>
    public RoseDrawing[] Roses { get; init; } = [];

    /// <summary>One per dike.</summary>
    public WidthDrawing[] Widths { get; init; } = [];

    /// <summary>Pictures of the cloud: natural colour and classes, plan and front.</summary>
    public ViewImage[] Views { get; init; } = [];

    /// <summary>The surface from above on a regular raster; null without points or when pictures are off.</summary>
    public SurfaceRaster? Surface { get; init; }

    /// <summary>The structural map; null without anything to show.</summary>
    public MapDrawing? Map { get; init; }

    /// <summary>Outlines and triangles of the faces, in their order.</summary>
    public FaceShapes Faces { get; init; } = new();

    /// <summary>Contacts as strips, in the order of contacts.</summary>
    public ContactStrip[] Strips { get; init; } = [];

    /// <summary>The cloud thinned for views in three dimensions.</summary>
    public ThinnedCloud Cloud { get; init; } = new();

    /// <summary>Cross-sections at stations, dike after dike in order of chainage.</summary>
    public CrossSection[] Sections { get; init; } = [];

    /// <summary>Cover, inclusions and density along each dike, dike after dike in order of chainage.</summary>
    public ChainageCell[] Chainage { get; init; } = [];
}
