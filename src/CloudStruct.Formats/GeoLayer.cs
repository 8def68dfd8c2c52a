namespace CloudStruct.Formats;

/// <summary>A layer of features for a map program.</summary>
public sealed record GeoLayer
{
    /// <summary>Name in lower case: "faces".</summary>
    public string Name { get; init; } = "";

    /// <summary>What one feature is, in a sentence.</summary>
    public string Meaning { get; init; } = "";

    /// <summary>Kind of all its shapes.</summary>
    public GeoShape Shape { get; init; }

    /// <summary>Whether vertices have heights.</summary>
    public bool HasZ { get; init; }

    /// <summary>Names of the columns in order.</summary>
    public GeoColumn[] Columns { get; init; } = [];

    /// <summary>Features in order.</summary>
    public GeoFeature[] Features { get; init; } = [];

    /// <summary>Style as Symbology Encoding text (Styled Layer Descriptor); empty for none.</summary>
    public string Sld { get; init; } = "";
}
