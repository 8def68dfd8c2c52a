namespace CloudStruct.Formats.Tables;

/// <summary>What the metadata says of every table of a run.</summary>
public sealed record TableFacts
{
    /// <summary>Id of the run that made the tables.</summary>
    public string RunId { get; init; } = "";

    /// <summary>Axes and origin of x, y, z in words.</summary>
    public string Frame { get; init; } = "";

    /// <summary>Which north azimuths refer to, and by how much they were turned.</summary>
    public string North { get; init; } = "";

    /// <summary>Name and code of the coordinate system, or that none is stated.</summary>
    public string Crs { get; init; } = "";

    /// <summary>Licence of the data as the survey states it; empty when not stated.</summary>
    public string Licence { get; init; } = "";

    /// <summary>How to cite the data; empty when not stated.</summary>
    public string Citation { get; init; } = "";
}
