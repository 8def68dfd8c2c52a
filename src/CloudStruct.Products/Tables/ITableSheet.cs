using CloudStruct.Formats.Tables;
using CloudStruct.Records.Drawings;

namespace CloudStruct.Products.Tables;

/// <summary>One table: its columns in words, and its rows from the findings.</summary>
public interface ITableSheet
{
    /// <summary>File name: "faces.csv".</summary>
    string File { get; }

    /// <summary>Title.</summary>
    string Title { get; }

    /// <summary>What one row is, in plain words.</summary>
    string Meaning { get; }

    /// <summary>Columns in the order of the file. New ones go at the end.</summary>
    IReadOnlyList<CsvColumn> Columns { get; }

    /// <summary>The words that may stand in a column, by its name; columns of numbers and free text are not listed.</summary>
    IReadOnlyDictionary<string, string[]> Words { get; }

    /// <summary>Whether the table is written at all.</summary>
    bool Applies(Findings findings);

    /// <summary>The table with a row for all that was found; a header alone when nothing was.</summary>
    CsvSheet Fill(Findings findings);

    /// <summary>The same rows with all digits of their numbers: text, long, double, or null where not determined.</summary>
    IEnumerable<object?[]> Values(Findings findings);
}
