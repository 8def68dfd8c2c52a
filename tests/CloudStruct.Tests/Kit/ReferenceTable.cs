using System.Globalization;

namespace CloudStruct.Tests.Kit;

/// <summary>A small comma-separated table of testdata: one header line, no quoting.</summary>
internal sealed class ReferenceTable
{
    private readonly string[] header;
    private readonly string[][] rows;

    private ReferenceTable(string[] header, string[][] rows) => (this.header, this.rows) = (header, rows);

    public int Count => rows.Length;

    /// <summary>Reads a file named relative to testdata.</summary>
    public static ReferenceTable Read(string name)
    {
        string[][] lines = [.. File.ReadAllLines(Repo.Path("testdata/" + name))
            .Where(l => l.Length > 0).Select(l => l.Split(',').Select(c => c.Trim('"')).ToArray())];
        return new ReferenceTable(lines[0], lines[1..]);
    }

    public string Text(int row, string column) => rows[row][Array.IndexOf(header, column)];

    public double Number(int row, string column) => double.Parse(Text(row, column), CultureInfo.InvariantCulture);

    /// <summary>The value of a column in the row whose first cell is the key.</summary>
    public double Of(string key, string column) => Number(Array.FindIndex(rows, r => r[0] == key), column);

    public double[] Column(string column) => [.. Enumerable.Range(0, Count).Select(i => Number(i, column))];
}
