using System.Globalization;
using System.Text;

namespace CloudStruct.Formats.Tables;

/// <summary>A table to be written by RFC 4180: UTF-8, header row, commas, CR LF, empty cell for what is not determined.</summary>
public sealed class CsvSheet
{
    private readonly List<string[]> rows = [];

    /// <summary>An empty table.</summary>
    /// <param name="fileName">"faces.csv".</param>
    /// <param name="title">What the table holds, in a sentence.</param>
    /// <param name="columns">Its columns in order.</param>
    public CsvSheet(string fileName, string title, params CsvColumn[] columns)
    {
        FileName = fileName;
        Title = title;
        Columns = columns;
        string? twice = columns.GroupBy(c => c.Name).FirstOrDefault(g => g.Count() > 1)?.Key;
        if (twice != null) throw new ArgumentException($"column {twice} stands twice in {fileName}");
    }

    /// <summary>File name without folders.</summary>
    public string FileName { get; }

    /// <summary>What the table holds.</summary>
    public string Title { get; }

    /// <summary>Columns in order.</summary>
    public IReadOnlyList<CsvColumn> Columns { get; }

    /// <summary>Rows so far.</summary>
    public int Count => rows.Count;

    /// <summary>Rows as they are written, cell by cell.</summary>
    public IReadOnlyList<string[]> Rows => rows;

    /// <summary>Appends a row: one value per column; null, NaN and infinity give an empty cell; enums their name in snake case.</summary>
    public void Add(params object?[] cells)
    {
        if (cells.Length != Columns.Count)
            throw new ArgumentException($"{FileName} has {Columns.Count} columns, {cells.Length} cells were given");
        var row = new string[cells.Length];
        for (int i = 0; i < cells.Length; i++) row[i] = CellText.Of(Columns[i].Kind, cells[i]);
        rows.Add(row);
    }

    /// <summary>Writes header and rows; the stream stays open.</summary>
    public void Write(Stream stream)
    {
        using var writer = new StreamWriter(stream, new UTF8Encoding(false), 1 << 16, leaveOpen: true) { NewLine = "\r\n" };
        WriteLine(writer, [.. Columns.Select(c => c.Name)]);
        foreach (string[] row in rows) WriteLine(writer, row);
    }

    /// <summary>The table as text.</summary>
    public override string ToString()
    {
        using var stream = new MemoryStream();
        Write(stream);
        return Encoding.UTF8.GetString(stream.ToArray());
    }

    private static void WriteLine(StreamWriter writer, string[] cells)
    {
        for (int i = 0; i < cells.Length; i++)
        {
            if (i > 0) writer.Write(',');
            writer.Write(Quoted(cells[i]));
        }
        writer.WriteLine();
    }

    private static string Quoted(string cell) =>
        cell.AsSpan().IndexOfAny(",\"\r\n") < 0 ? cell : $"\"{cell.Replace("\"", "\"\"", false, CultureInfo.InvariantCulture)}\"";
}
