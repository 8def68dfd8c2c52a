using System.Text.Json;
using CloudStruct.Formats.Bytes;
using CloudStruct.Records.Complaints;
using NetTopologySuite.Features;
using NetTopologySuite.Geometries;
using NetTopologySuite.IO.Converters;
using static System.FormattableString;

namespace CloudStruct.Formats.GeoJson;

/// <summary>Features of a GeoJSON file, in the survey's coordinates.</summary>
/// <remarks>RFC 7946 speaks of longitudes and latitudes; files of a survey hold the survey's own coordinates, as desktop
/// programs write them when asked for another system (common practice).</remarks>
internal static class GeoJsonFile
{
    private const long MostBytes = 1L << 28;

    /// <summary>Reads a FeatureCollection, one Feature, or a bare geometry.</summary>
    /// <exception cref="InputException">The file is not GeoJSON.</exception>
    public static IReadOnlyList<IFeature> Read(string path)
    {
        using var file = new FileBytes(path);
        if (file.Length > MostBytes) throw new InputException(file.Name, "the file is too large", Invariant($"{file.Length} bytes"), "Simplify what was drawn");
        byte[] bytes = file.Take(0, file.Length, "the file");
        ReadOnlySpan<byte> text = bytes.AsSpan().StartsWith((ReadOnlySpan<byte>)[0xEF, 0xBB, 0xBF]) ? bytes.AsSpan(3) : bytes;
        if (!System.Text.Unicode.Utf8.IsValid(text)) throw NotGeoJson(file.Name, "text that is not UTF-8");
        var options = new JsonSerializerOptions();
        options.Converters.Add(new GeoJsonConverterFactory());
        try
        {
            string type = Type(text);
            return type switch
            {
                "FeatureCollection" => [.. JsonSerializer.Deserialize<FeatureCollection>(text, options) ?? []],
                "Feature" => [JsonSerializer.Deserialize<IFeature>(text, options)!],
                "" => throw NotGeoJson(file.Name, "no member \"type\""),
                _ => [new Feature(JsonSerializer.Deserialize<Geometry>(text, options), new AttributesTable())],
            };
        }
        catch (Exception e) when (e is JsonException or ArgumentException or InvalidOperationException or FormatException or NotSupportedException or OverflowException)
        {
            throw NotGeoJson(file.Name, e is JsonException { LineNumber: long line } ? Invariant($"a fault at line {line + 1}") : "shapes that are not closed or complete", e);
        }
    }

    private static string Type(ReadOnlySpan<byte> text)
    {
        var reader = new Utf8JsonReader(text);
        if (!reader.Read() || reader.TokenType != JsonTokenType.StartObject) return "";
        while (reader.Read() && reader.TokenType == JsonTokenType.PropertyName)
        {
            bool isType = reader.ValueTextEquals("type"u8);
            reader.Read();
            if (isType) return reader.TokenType == JsonTokenType.String ? reader.GetString()! : "";
            reader.Skip();
        }
        return "";
    }

    private static InputException NotGeoJson(string name, string found, Exception? inner = null) =>
        new(name, "the file is not GeoJSON that can be read", found, "Export it again as GeoJSON in the survey's coordinate system", inner);
}
