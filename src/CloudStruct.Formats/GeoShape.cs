namespace CloudStruct.Formats;

/// <summary>Kind of the shapes of a layer.</summary>
public enum GeoShape
{
    /// <summary>A table without shapes.</summary>
    None,

    /// <summary>One vertex.</summary>
    Point,

    /// <summary>An open line.</summary>
    Line,

    /// <summary>One outer ring, closed, counter-clockwise seen from above.</summary>
    Polygon,
}
