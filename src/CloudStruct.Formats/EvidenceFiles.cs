using CloudStruct.Formats.GeoJson;
using CloudStruct.Formats.GeoPackage;
using CloudStruct.Formats.Tables;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Decisions;
using CloudStruct.Records.Field;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Sets;

namespace CloudStruct.Formats;

/// <summary>The door for what people add to a survey: labels, control points, a baseline. Coordinates are the survey's.</summary>
public static class EvidenceFiles
{
    private static readonly string[] LabelExtensions = [".csv", ".geojson", ".json", ".gpkg", ".las", ".laz"];

    /// <summary>Whether a file in a survey's labels folder is meant as labels, by its extension in any case.</summary>
    public static bool IsLabelName(string name) => LabelExtensions.Contains(Path.GetExtension(name), StringComparer.OrdinalIgnoreCase);

    /// <summary>Hand labels of one file: points from CSV and LAS (classes 64 to 68, all for training), polygons from GeoJSON and GeoPackage.</summary>
    /// <exception cref="InputException">The file is not understood.</exception>
    public static HandLabels ReadLabels(string path) => Path.GetExtension(path).ToLowerInvariant() switch
    {
        ".csv" => new HandLabels { Points = LabelTable.Read(path) },
        ".geojson" or ".json" => GeoJsonLabels.Read(path),
        ".gpkg" => GeoPackageLabels.Read(path),
        ".las" or ".laz" => new HandLabels { Points = LabelledPoints(path) },
        _ => throw new InputException(Path.GetFileName(path), "labels of this kind are not read", "extension " + Path.GetExtension(path),
            "Give labels as CSV points, GeoJSON or GeoPackage polygons, or a LAS file with classes 64 to 68"),
    };

    /// <summary>Labels of several files together, in the order given.</summary>
    public static HandLabels ReadLabels(IEnumerable<string> paths)
    {
        HandLabels[] all = [.. paths.Select(ReadLabels)];
        return new HandLabels { Points = [.. all.SelectMany(l => l.Points)], Polygons = [.. all.SelectMany(l => l.Polygons)] };
    }

    /// <summary>Control and check points of control/checkpoints.csv.</summary>
    /// <exception cref="InputException">The table is not understood.</exception>
    public static ControlPoint[] ReadControl(string path) => ControlTable.Read(path);

    /// <summary>Compass readings of field/readings.csv, azimuths from true or grid north.</summary>
    /// <param name="path">The table.</param>
    /// <param name="declination">What the survey says of magnetic north.</param>
    /// <param name="notation">"strike/dip" or "dip direction/dip" where the survey says it.</param>
    /// <exception cref="InputException">The table is not understood.</exception>
    public static FieldReading[] ReadReadings(string path, Declination declination, string? notation) => ReadingTable.Read(path, declination.At, notation);

    /// <summary>The line of a baseline/*.geojson; z is 0 where the file has none.</summary>
    /// <exception cref="InputException">The file does not hold exactly one line.</exception>
    public static Vec3[] ReadBaseline(string path) => GeoJsonLine.Read(path);

    /// <summary>The zones of a zones/*.geojson: polygons, named by their property name or zone, else by the file.</summary>
    /// <exception cref="InputException">The file is not understood, or a feature is no polygon.</exception>
    public static Zone[] ReadZones(string path) => GeoJsonZones.Read(path);

    /// <summary>What a geologist decided by hand: decisions.csv.</summary>
    /// <exception cref="InputException">The table is not understood.</exception>
    public static Decision[] ReadDecisions(string path) => DecisionTable.Read(path);

    private static LabelPoint[] LabelledPoints(string path)
    {
        var points = new List<LabelPoint>();
        foreach (SourceBlock block in CloudFiles.Open(path).Read(CancellationToken.None))
        {
            using (block)
            {
                for (int i = 0; i < block.Count; i++)
                {
                    if (block.Class[i] is >= (byte)RockClass.Host and <= (byte)RockClass.Loose)
                        points.Add(new LabelPoint(new Vec3(block.X[i], block.Y[i], block.Z[i]), (RockClass)block.Class[i], LabelUse.Train));
                }
            }
        }
        if (points.Count == 0)
            throw new InputException(Path.GetFileName(path), "the label file has no labelled point", "no point of class 64 to 68 (host, dike, cover, inclusion, loose)",
                "Classify points by hand with these codes (LAS 1.4, point format 6 or later)");
        return [.. points];
    }
}
