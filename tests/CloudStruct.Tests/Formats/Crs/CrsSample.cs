using System.Text.Json;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Formats.Crs;

/// <summary>A coordinate system as projinfo (PROJ 9.1.1) writes it from the EPSG registry.</summary>
/// <param name="Code">EPSG code, with the vertical one after a plus for compound systems.</param>
/// <param name="Kind">WKT1_GDAL, WKT1_ESRI, WKT2:2015, WKT2:2019.</param>
/// <param name="Text">The text.</param>
public sealed record CrsSample(string Code, string Kind, string Text)
{
    /// <summary>All of testdata/reference/crs_texts.json.</summary>
    public static CrsSample[] All() => JsonSerializer.Deserialize<CrsSample[]>(
        File.ReadAllText(Repo.Path("testdata/reference/crs_texts.json")), new JsonSerializerOptions { PropertyNameCaseInsensitive = true })!;
}
