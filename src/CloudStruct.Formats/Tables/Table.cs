using System.Globalization;
using CloudStruct.Records.Complaints;
using static System.FormattableString;

namespace CloudStruct.Formats.Tables;

/// <summary>A table as read: cells by column name, numbers by the file's own decimal mark.</summary>
public sealed class Table
{
    private readonly Dictionary<string, int> places = new(StringComparer.OrdinalIgnoreCase);
    private readonly string[][] rows;
    private readonly int[] lines;
    private readonly DecimalMark mark;

    internal Table(string name, string[] columns, string[][] rows, int[] lines)
    {
        Name = name;
        Columns = columns;
        this.rows = rows;
        this.lines = lines;
        for (int i = 0; i < columns.Length; i++)
        {
            if (columns[i].Length > 0 && !places.TryAdd(columns[i], i))
                throw new InputException(Invariant($"{name}, line 1"), "a column name stands twice", columns[i], "Rename one of them");
        }
        mark = DecimalMark.Of(rows);
    }

    /// <summary>File name without folders.</summary>
    public string Name { get; }

    /// <summary>Column names in order, blanks trimmed.</summary>
    public IReadOnlyList<string> Columns { get; }

    /// <summary>Rows under the header.</summary>
    public int Count => rows.Length;

    /// <summary>Whether a column of this name exists, case aside.</summary>
    public bool Has(string column) => places.ContainsKey(column);

    /// <summary>Line of the file at which a row stands, for messages.</summary>
    public int Line(int row) => lines[row];

    /// <summary>Complains unless all these columns exist.</summary>
    /// <exception cref="InputException">Names the missing ones and those that are there.</exception>
    public void Need(params ReadOnlySpan<string> columns)
    {
        var missing = new List<string>();
        foreach (string column in columns)
        {
            if (!Has(column)) missing.Add(column);
        }
        if (missing.Count > 0)
            throw new InputException(Invariant($"{Name}, line 1"), Invariant($"the table lacks the column {string.Join(", ", missing)}"),
                Invariant($"columns {string.Join(", ", Columns.Take(20))}"), "Name the columns as the documentation says; order does not matter");
    }

    /// <summary>Text of a cell, trimmed; empty when the column does not exist.</summary>
    public string Text(int row, string column) => places.TryGetValue(column, out int c) ? rows[row][c] : "";

    /// <summary>Number of a cell; null when it is empty or the column does not exist.</summary>
    /// <exception cref="InputException">It is not a finite number, or its decimal mark cannot be told from a separator of thousands.</exception>
    public double? NumberOrNull(int row, string column)
    {
        string text = Text(row, column);
        if (text.Length == 0) return null;
        if (mark.Fault is string fault && text.Contains(',', StringComparison.Ordinal))
            throw Fault(row, column, fault, text, "Write numbers with a decimal point");
        if (double.TryParse(mark.Plain(text), NumberStyles.Float, CultureInfo.InvariantCulture, out double v) && double.IsFinite(v)) return v;
        throw Fault(row, column, "a number was expected", text, "Correct the cell, or leave it empty where nothing is known");
    }

    /// <summary>Number of a cell that must be there.</summary>
    public double Number(int row, string column) =>
        NumberOrNull(row, column) ?? throw Fault(row, column, "a number is missing", "an empty cell", "Fill it in or remove the row");

    /// <summary>A complaint about a cell.</summary>
    public InputException Fault(int row, string column, string what, string found, string mend) =>
        new(Invariant($"{Name}, line {lines[row]}, column {column}"), what, found.Length > 60 ? found[..60] + "..." : found, mend);
}
