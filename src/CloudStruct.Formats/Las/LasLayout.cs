using CloudStruct.Records.Frame;

namespace CloudStruct.Formats.Las;

/// <summary>What a LAS file to be written looks like: decided before the first point.</summary>
public sealed record LasLayout
{
    /// <summary>Minor version: 4 (point format 7 with colour, 6 without) or 2 (point format 2 or 0), for old readers.</summary>
    public int Minor { get; init; } = 4;

    /// <summary>Whether colour is stored (16 bits a channel).</summary>
    public bool HasColour { get; init; } = true;

    /// <summary>Step of stored coordinates, in file units. A millimetre is finer than any photogrammetric cloud.</summary>
    public Vec3 Scale { get; init; } = new(0.001, 0.001, 0.001);

    /// <summary>Added to stored coordinates. Coordinates may lie up to 2^31 steps from it.</summary>
    public Vec3 Offset { get; init; }

    /// <summary>Date of the data, not of the writing; null writes zeros.</summary>
    public DateOnly? Date { get; init; }

    /// <summary>WKT1 text of the coordinate system; empty for none.</summary>
    public string Wkt { get; init; } = "";

    /// <summary>EPSG code, used by minor version 2, which keeps the system as GeoTIFF keys; 0 when unknown.</summary>
    public int Epsg { get; init; }

    /// <summary>Where the points come from in the words of the standard: "OTHER", "MODIFICATION", "MERGE", "EXTRACTION".</summary>
    public string SystemIdentifier { get; init; } = "OTHER";

    /// <summary>Whether points are compressed (LAZ): version-2 items under minor version 2, layered ones under 4.</summary>
    public bool Compressed { get; init; }

    /// <summary>Columns of our own after the standard ones.</summary>
    public LasExtra[] Extras { get; init; } = [];

    /// <summary>Point format that follows from version and colour.</summary>
    public int PointFormat => Minor >= 4 ? (HasColour ? 7 : 6) : HasColour ? 2 : 0;

    /// <summary>Same layout with an offset and a scale under which everything between two corners can be stored.</summary>
    /// <param name="min">Lowest corner, file units.</param>
    /// <param name="max">Highest corner, file units.</param>
    /// <remarks>The offset is the middle rounded to whole hundreds; the scale stays unless the extent needs a coarser step.</remarks>
    public LasLayout Around(Vec3 min, Vec3 max)
    {
        static double Middle(double a, double b) => Math.Round((a + b) / 200) * 100;
        var offset = new Vec3(Middle(min.X, max.X), Middle(min.Y, max.Y), Middle(min.Z, max.Z));
        static double Step(double scale, double offset, double a, double b)
        {
            double reach = Math.Max(Math.Abs(a - offset), Math.Abs(b - offset));
            while (reach / scale > 2.0e9) scale *= 10;
            return scale;
        }
        return this with
        {
            Offset = offset,
            Scale = new(Step(Scale.X, offset.X, min.X, max.X), Step(Scale.Y, offset.Y, min.Y, max.Y),
                Step(Scale.Z, offset.Z, min.Z, max.Z)),
        };
    }
}
