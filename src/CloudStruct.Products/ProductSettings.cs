using CloudStruct.Records.Stages;

namespace CloudStruct.Products;

/// <summary>What is written beside the tables, plots and the report.</summary>
public sealed record ProductSettings : IStageSettings
{
    /// <summary>The classified cloud: las (every input point, as LAS 1.4), laz (the same, compressed), thinned (the
    /// evenly spaced working points only, a much smaller file) or none.</summary>
    public string Clouds { get; init; } = "las";

    /// <summary>Whether the layers of the map are also written as GeoJSON.</summary>
    public bool Geojson { get; init; }

    /// <inheritdoc/>
    public IEnumerable<SettingComplaint> Check()
    {
        if (Clouds is not ("las" or "laz" or "thinned" or "none"))
            yield return new("products.clouds", Clouds, "must be las, laz, thinned or none");
    }
}
