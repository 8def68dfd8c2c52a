using System.Text;
using CloudStruct.Formats.Bytes;
using CloudStruct.Records.Complaints;
using CsvHelper;
using static System.FormattableString;

namespace CloudStruct.Formats.Tables;

/// <summary>Reads tables of people: comma or semicolon, decimal point or comma, UTF-8 or UTF-16, with or without a byte-order mark.</summary>
/// <remarks>What is ambiguous is an error: a header with both separators, text that is no UTF-8, rows of another length.</remarks>
public static class TableReader
{
    // Hand-made tables are small; the limit keeps a cloud named .csv from filling the memory.
    private const long MostBytes = 1L << 28;

    /// <summary>Reads a whole table.</summary>
    /// <exception cref="InputException">The table cannot be read without guessing.</exception>
    public static Table Read(string path)
    {
        using var file = new FileBytes(path);
        if (file.Length > MostBytes)
            throw new InputException(file.Name, "the table is too large", Invariant($"{file.Length} bytes"), "Give clouds as LAS or PLY; tables hold what people measured");
        return Parse(Decode(file.Take(0, file.Length, "the table"), file.Name), file.Name);
    }

    /// <summary>Reads a table from text.</summary>
    /// <param name="text">Header row and rows.</param>
    /// <param name="name">Name for messages.</param>
    public static Table Parse(string text, string name)
    {
        var options = new CsvReaderOptions
        {
            Separator = Separator(text, name), HasHeader = false, TrimWhitespace = true, TrackLineNumbers = true,
            MalformedData = CsvMalformedDataHandling.Throw,
        };
        var rows = new List<string[]>();
        var lines = new List<int>();
        string[]? columns = null;
        try
        {
            using CsvReader reader = CsvReader.FromText(text, options);
            while (reader.Read())
            {
                string[] cells = Cells(reader);
                if (cells.All(c => c.Length == 0)) continue;
                if (columns == null)
                {
                    columns = cells;
                    continue;
                }
                rows.Add(Fitted(cells, columns.Length, name, (int)reader.LineNumber));
                lines.Add((int)reader.LineNumber);
            }
        }
        catch (CsvFormatException e)
        {
            throw new InputException(Invariant($"{name}, line {e.LineNumber}"), "a quote stands where none may stand, or is not closed", "unbalanced quotes",
                "Quote whole cells, and double a quote inside", e);
        }
        if (columns == null) throw new InputException(name, "the table is empty", "no header row", "Give a header row with column names");
        return new Table(name, columns, [.. rows], [.. lines]);
    }

    private static string[] Cells(CsvReader reader)
    {
        var cells = new string[reader.FieldCount];
        for (int i = 0; i < cells.Length; i++) cells[i] = reader.GetString(i);
        return cells;
    }

    // Spreadsheets leave empty cells behind the last column.
    private static string[] Fitted(string[] cells, int columns, string name, int line)
    {
        if (cells.Length > columns && cells.Skip(columns).All(c => c.Length == 0)) return cells[..columns];
        if (cells.Length == columns) return cells;
        throw new InputException(Invariant($"{name}, line {line}"), "a row has another number of cells than the header",
            Invariant($"{cells.Length} cells, {columns} columns"), "Correct the row; a text with the separator in it needs quotes");
    }

    private static char Separator(string text, string name)
    {
        int end = text.AsSpan().TrimStart("\r\n \t").IndexOfAny('\r', '\n');
        ReadOnlySpan<char> header = text.AsSpan().TrimStart("\r\n \t");
        if (end >= 0) header = header[..end];
        bool quoted = false, commas = false, semicolons = false, tabs = false;
        foreach (char c in header)
        {
            if (c == '"') quoted = !quoted;
            if (quoted) continue;
            commas |= c == ',';
            semicolons |= c == ';';
            tabs |= c == '\t';
        }
        if ((commas ? 1 : 0) + (semicolons ? 1 : 0) + (tabs ? 1 : 0) > 1)
            throw new InputException(Invariant($"{name}, line 1"), "the header holds more than one kind of separator", header.Length > 80 ? header[..80].ToString() : header.ToString(),
                "Use commas or semicolons throughout");
        return semicolons ? ';' : tabs ? '\t' : ',';
    }

    private static string Decode(byte[] bytes, string name)
    {
        ReadOnlySpan<byte> b = bytes;
        if (b.StartsWith((ReadOnlySpan<byte>)[0xEF, 0xBB, 0xBF])) b = b[3..];
        else if (b.StartsWith((ReadOnlySpan<byte>)[0xFF, 0xFE])) return Wide(Encoding.Unicode, b[2..], name);
        else if (b.StartsWith((ReadOnlySpan<byte>)[0xFE, 0xFF])) return Wide(Encoding.BigEndianUnicode, b[2..], name);
        else if (b.Length >= 4 && b[1] == 0 && b[3] == 0) return Wide(Encoding.Unicode, b, name);
        else if (b.Length >= 4 && b[0] == 0 && b[2] == 0) return Wide(Encoding.BigEndianUnicode, b, name);
        if (b.Contains((byte)0)) throw NotText(name, "zero bytes in it");
        try
        {
            return new UTF8Encoding(false, true).GetString(b);
        }
        catch (DecoderFallbackException e)
        {
            throw new InputException(Invariant($"{name}, byte {e.Index}"), "the text is not UTF-8", "a byte of another code page",
                "Save the table as \"CSV UTF-8\" and run again", e);
        }
    }

    private static string Wide(Encoding encoding, ReadOnlySpan<byte> bytes, string name) =>
        bytes.Length % 2 == 0 ? encoding.GetString(bytes) : throw NotText(name, "UTF-16 with an odd number of bytes");

    private static InputException NotText(string name, string found) => new(name, "the file is not a text table", found, "Save the table as CSV (UTF-8) and run again");
}
