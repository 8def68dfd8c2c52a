using System.Text.Json;
using CloudStruct.Records.Frame;
using static System.FormattableString;

namespace CloudStruct.Formats.GeoJson;

/// <summary>Writes a layer as a FeatureCollection in the survey's own coordinates.</summary>
/// <remarks>RFC 7946 speaks of longitudes and latitudes only; a projected survey keeps its coordinates and names its system
/// in the member "crs" of the older GeoJSON of 2008, which map programs still read (common practice).</remarks>
public static class GeoJsonWriter
{
    /// <summary>Writes a layer; the stream stays open.</summary>
    public static void Write(Stream stream, GeoLayer layer, CrsInfo crs)
    {
        using var json = new Utf8JsonWriter(stream);
        json.WriteStartObject();
        json.WriteString("type", "FeatureCollection");
        json.WriteString("name", layer.Name);
        if (crs is { Epsg: > 0, HorizontalUnitM: 1 })
        {
            json.WriteStartObject("crs");
            json.WriteString("type", "name");
            json.WriteStartObject("properties");
            json.WriteString("name", Invariant($"urn:ogc:def:crs:EPSG::{crs.Epsg}"));
            json.WriteEndObject();
            json.WriteEndObject();
        }

        json.WriteStartArray("features");
        foreach (GeoFeature feature in layer.Features) Write(json, layer, feature);
        json.WriteEndArray();
        json.WriteEndObject();
    }

    private static void Write(Utf8JsonWriter json, GeoLayer layer, GeoFeature feature)
    {
        json.WriteStartObject();
        json.WriteString("type", "Feature");
        json.WriteStartObject("properties");
        for (int i = 0; i < layer.Columns.Length; i++)
        {
            json.WritePropertyName(layer.Columns[i].Name);
            switch (feature.Values[i])
            {
                case string { Length: > 0 } s: json.WriteStringValue(s); break;
                case double d when double.IsFinite(d): json.WriteNumberValue(d); break;
                case long n: json.WriteNumberValue(n); break;
                case int n: json.WriteNumberValue(n); break;
                default: json.WriteNullValue(); break;
            }
        }

        json.WriteEndObject();
        if (layer.Shape == GeoShape.None)
        {
            json.WriteNull("geometry");
            json.WriteEndObject();
            return;
        }

        json.WriteStartObject("geometry");
        json.WriteString("type", layer.Shape switch { GeoShape.Point => "Point", GeoShape.Line => "LineString", _ => "Polygon" });
        json.WritePropertyName("coordinates");
        if (layer.Shape == GeoShape.Polygon) json.WriteStartArray();
        if (layer.Shape != GeoShape.Point) json.WriteStartArray();
        foreach (Vec3 p in feature.Points)
        {
            json.WriteStartArray();
            json.WriteNumberValue(Math.Round(p.X, 4));
            json.WriteNumberValue(Math.Round(p.Y, 4));
            if (layer.HasZ) json.WriteNumberValue(Math.Round(p.Z, 4));
            json.WriteEndArray();
        }

        if (layer.Shape != GeoShape.Point) json.WriteEndArray();
        if (layer.Shape == GeoShape.Polygon) json.WriteEndArray();
        json.WriteEndObject();
        json.WriteEndObject();
    }
}
