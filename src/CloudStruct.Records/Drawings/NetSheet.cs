namespace CloudStruct.Records.Drawings;

/// <summary>Several nets on one sheet of page width.</summary>
public sealed record NetSheet
{
    /// <summary>File stem: "nets-dike-host".</summary>
    public string Name { get; init; } = "";

    /// <summary>Title above all.</summary>
    public string Title { get; init; } = "";

    /// <summary>Nets in a row.</summary>
    public int Columns { get; init; } = 2;

    /// <summary>Nets in reading order; their sentences stand beneath each.</summary>
    public NetDrawing[] Nets { get; init; } = [];

    /// <summary>What holds for all, beneath them.</summary>
    public string Sentence { get; init; } = "";
}
