using CloudStruct.Formats.Tables;

namespace CloudStruct.Formats;

/// <summary>A column of a layer.</summary>
/// <param name="Name">Snake-case name that ends in its unit.</param>
/// <param name="Kind">What it holds; numbers keep all their digits.</param>
public sealed record GeoColumn(string Name, CsvKind Kind)
{
    /// <summary>Whether cells are whole numbers.</summary>
    public bool IsInteger => Kind == CsvKind.Integer;

    /// <summary>Whether cells are text.</summary>
    public bool IsText => Kind is CsvKind.Text or CsvKind.YesNo;
}
