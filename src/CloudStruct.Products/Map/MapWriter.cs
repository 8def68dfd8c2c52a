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
    /// <summary>Writes all.</summary>
    public static void Write(ResultFolder files, Findings findings, DrawingsRecord drawings, RunFacts facts, ProductSettings settings, int threads)
    {
        CrsInfo crs = findings.Intake.Frame.Crs;
        GeoLayer[] layers = MapLayers.Of(findings, drawings);
        GeoPackageWriter.Write(files.Reserve("map/structures.gpkg"), layers, crs, facts.InputDate);
        if (settings.Geojson)
        {
            foreach (GeoLayer layer in layers.Where(l => l.Shape != GeoShape.None))
            {
                using Stream stream = files.Create($"map/{layer.Name}.geojson");
                GeoJsonWriter.Write(stream, layer, crs);
            }
        }

        if (drawings.Surface is not { } surface) return;
        SurveyFrame frame = findings.Intake.Frame;
        var place = new RasterPlace(
            surface.Width, surface.Height, surface.PixelM, surface.LeftM + frame.Origin.X, surface.TopM + frame.Origin.Y, crs, facts.InputDate,
            "", "CloudStruct " + facts.ToolVersion);
        using (Stream stream = files.Create("map/ortho.tif"))
        {
            string what = surface.HasColour ? "colours of the cloud seen from above" : "relief of the cloud seen from above";
            GeoTiffWriter.WriteColour(stream, surface.Rgba, place with { Description = $"{what}, run {facts.RunId}" }, threads);
        }

        using (Stream stream = files.Create("map/surface.tif"))
        {
            float[] heights = new float[surface.HeightM.Length];
            for (int i = 0; i < heights.Length; i++) heights[i] = (float)(surface.HeightM[i] + frame.Origin.Z);
            GeoTiffWriter.WriteHeights(stream, heights, place with { Description = $"height of the highest surface in metres, run {facts.RunId}" }, threads);
        }
    }
}
