using CloudStruct.Records.Points;

namespace CloudStruct.Products;

/// <summary>What the sheets say about the run itself: gathered by the program, written by Products, computed by neither.</summary>
public sealed record RunFacts
{
    /// <summary>Version of the tool: "0.1.0".</summary>
    public string ToolVersion { get; init; } = "";

    /// <summary>Identifier of the run, made from version, inputs, recipe and seed: the same run has the same one.</summary>
    public string RunId { get; init; } = "";

    /// <summary>Date of the input (flight date, else the date in the cloud's header); null when none is known. It is the
    /// only date in any product: today's would make two equal runs differ.</summary>
    public DateOnly? InputDate { get; init; }

    /// <summary>Licence of the data as stated in survey.yaml; empty when none is.</summary>
    public string Licence { get; init; } = "";

    /// <summary>How to cite the data, as stated in survey.yaml; empty when nothing is.</summary>
    public string Citation { get; init; } = "";

    /// <summary>Name of the recipe: "dike-survey".</summary>
    public string RecipeName { get; init; } = "";

    /// <summary>The recipe in full, as YAML text, without any path of the machine.</summary>
    public string Recipe { get; init; } = "";

    /// <summary>Input files with size and hash.</summary>
    public InputFile[] Inputs { get; init; } = [];

    /// <summary>Seed of the run.</summary>
    public ulong Seed { get; init; }

    /// <summary>The north of the tables in one plain sentence.</summary>
    public string NorthText { get; init; } = "";

    /// <summary>Versions of what computed the run, in order: "CloudStruct" and "0.1.0", ".NET" and "10.0.0", ...</summary>
    public HeaderFact[] Versions { get; init; } = [];
}
