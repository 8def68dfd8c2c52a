using System.Text.Json;

namespace CloudStruct.Formats.Tables;

/// <summary>Metadata of a group of tables as W3C CSV on the Web (Recommendation of 17 December 2015) asks: JSON.</summary>
public static class CsvMetadata
{
    /// <summary>Writes tables-metadata.json for tables that stand beside it; the stream stays open.</summary>
    public static void Write(Stream stream, IReadOnlyList<CsvSheet> sheets, TableFacts facts)
    {
        using var json = new Utf8JsonWriter(stream, new JsonWriterOptions
        {
            Indented = true,
            NewLine = "\n",
            Encoder = System.Text.Encodings.Web.JavaScriptEncoder.UnsafeRelaxedJsonEscaping,
        });
        json.WriteStartObject();
        json.WriteStartArray("@context");
        json.WriteStringValue("http://www.w3.org/ns/csvw");
        json.WriteStartObject();
        json.WriteString("@language", "en");
        json.WriteEndObject();
        json.WriteEndArray();
        json.WriteStartArray("tables");
        foreach (CsvSheet sheet in sheets) WriteTable(json, sheet, facts);
        json.WriteEndArray();
        json.WriteEndObject();
    }

    private static void WriteTable(Utf8JsonWriter json, CsvSheet sheet, TableFacts facts)
    {
        json.WriteStartObject();
        json.WriteString("url", sheet.FileName);
        json.WriteString("dc:title", sheet.Title);
        WriteUnlessEmpty(json, "dc:identifier", facts.RunId);
        WriteUnlessEmpty(json, "dc:license", facts.Licence);
        WriteUnlessEmpty(json, "dc:bibliographicCitation", facts.Citation);
        json.WriteStartArray("notes");
        json.WriteStartObject();
        WriteUnlessEmpty(json, "run_id", facts.RunId);
        WriteUnlessEmpty(json, "frame", facts.Frame);
        WriteUnlessEmpty(json, "north", facts.North);
        WriteUnlessEmpty(json, "crs", facts.Crs);
        json.WriteEndObject();
        json.WriteEndArray();
        json.WriteStartObject("tableSchema");
        json.WriteStartArray("columns");
        foreach (CsvColumn column in sheet.Columns) WriteColumn(json, column);
        json.WriteEndArray();
        json.WriteEndObject();
        json.WriteEndObject();
    }

    private static void WriteColumn(Utf8JsonWriter json, CsvColumn column)
    {
        json.WriteStartObject();
        json.WriteString("name", column.Name);
        json.WriteString("titles", column.Name);
        json.WriteString("datatype", column.Kind switch
        {
            CsvKind.Text or CsvKind.YesNo => "string",
            CsvKind.Integer => "integer",
            _ => "double",
        });
        WriteUnlessEmpty(json, "dc:description", column.Description);
        WriteUnlessEmpty(json, "schema:unitText", column.Unit);
        json.WriteEndObject();
    }

    private static void WriteUnlessEmpty(Utf8JsonWriter json, string name, string value)
    {
        if (value.Length > 0) json.WriteString(name, value);
    }
}
