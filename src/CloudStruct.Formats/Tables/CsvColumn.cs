namespace CloudStruct.Formats.Tables;

/// <summary>One column of a table.</summary>
/// <param name="Name">Snake-case name that ends in its unit: "strike_deg".</param>
/// <param name="Kind">What it holds.</param>
/// <param name="Unit">Unit in words for the metadata: "metre", "degree", "square metre"; empty for none.</param>
/// <param name="Description">What it means, in a sentence.</param>
public sealed record CsvColumn(string Name, CsvKind Kind, string Unit = "", string Description = "");
