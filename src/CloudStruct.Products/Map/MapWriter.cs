using CloudStruct.Formats;
using CloudStruct.Formats.GeoJson;
using CloudStruct.Formats.GeoPackage;
using CloudStruct.Formats.GeoTiff;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;

namespace CloudStruct.Products.Map;

/// <summary>Writes map/: structures.gpkg, ortho.tif and surface.tif, and GeoJSON where it is asked for.</summary>
internal static class MapWriter
{
    /// <summary>Notes the files, and gives the work of writing each.</summary>
    public static IEnumerable<Action> Plan(ResultFolder files, Findings findings, DrawingsRecord drawings, RunFacts facts, ProductSettings settings)
    {
        var work = new List<Action>();
        CrsInfo crs = findings.Intake.Frame.Crs;
        GeoLayer[] layers = MapLayers.Of(findings, drawings);
        string package = files.Reserve("map/structures.gpkg");
        work.Add(() => GeoPackageWriter.Write(package, layers, crs, facts.InputDate));
        if (settings.Geojson)
        {
            foreach (GeoLayer layer in layers.Where(l => l.Shape != GeoShape.None))
                work.Add(Into(files.Reserve($"map/{layer.Name}.geojson"), stream => GeoJsonWriter.Write(stream, layer, crs)));
        }

        if (drawings.Surface is not { } surface) return work;
        SurveyFrame frame = findings.Intake.Frame;
        var place = new RasterPlace(
            surface.Width, surface.Height, surface.PixelM, surface.LeftM + frame.Origin.X, surface.TopM + frame.Origin.Y, crs, facts.InputDate,
            "", "CloudStruct " + facts.ToolVersion);
        string what = surface.HasColour ? "colours of the cloud seen from above" : "relief of the cloud seen from above";
        work.Add(Into(files.Reserve("map/ortho.tif"), stream =>
            GeoTiffWriter.WriteColour(stream, surface.Rgba, place with { Description = $"{what}, run {facts.RunId}" }, 1)));
        work.Add(Into(files.Reserve("map/surface.tif"), stream =>
        {
            float[] heights = Array.ConvertAll(surface.HeightM, h => (float)(h + frame.Origin.Z));
            GeoTiffWriter.WriteHeights(stream, heights, place with { Description = $"height of the highest surface in metres, run {facts.RunId}" }, 1);
        }));
        return work;
    }

    private static Action Into(string path, Action<Stream> write) => () =>
    {
        using var stream = new FileStream(path, FileMode.Create, FileAccess.ReadWrite, FileShare.None);
        write(stream);
    };
}
