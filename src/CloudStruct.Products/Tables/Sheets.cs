namespace CloudStruct.Products.Tables;

/// <summary>All tables, each described in a file of its own.</summary>
public static partial class Sheets
{
    /// <summary>In the order of docs/tables.md and tables-metadata.json.</summary>
    public static IReadOnlyList<ITableSheet> All { get; } = [Faces(), Contacts(), Width(), Dikes(), Sets(), CommonMeans(), Classes(), Checkpoints(), WidthTrends(), Decisions()];
}
