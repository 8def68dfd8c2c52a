using System.Text;
using CloudStruct.Formats.Bytes;
using CloudStruct.Records.Complaints;
using static System.FormattableString;

namespace CloudStruct.Formats.Text;

/// <summary>How a cloud in plain text is written: what separates numbers, and which column is what.</summary>
/// <remarks>Told from its first lines. Without names three columns are x y z and six are x y z red green blue; seven are read when only
/// one place for the colour fits; anything else needs a first line with names.</remarks>
internal sealed record TextLayout
{
    private const int PeekBytes = 1 << 16, PeekLines = 400;

    private static readonly string[] X = ["x", "x_m", "east", "easting", "e"], Y = ["y", "y_m", "north", "northing", "n"], Z = ["z", "z_m", "height", "elevation", "h"];
    private static readonly string[] R = ["r", "red"], G = ["g", "green"], B = ["b", "blue"], C = ["class", "classification"];

    /// <summary>Separator: comma, semicolon, or blank for any run of blanks and tabs.</summary>
    public required char Separator { get; init; }

    /// <summary>Whether a comma is the decimal mark.</summary>
    public required bool DecimalComma { get; init; }

    /// <summary>Lines before the first point: names, or a count of points.</summary>
    public required int LinesBefore { get; init; }

    /// <summary>Columns of a line.</summary>
    public required int Columns { get; init; }

    /// <summary>Places of x, y, z.</summary>
    public required int[] Place { get; init; }

    /// <summary>Places of red, green, blue; empty without.</summary>
    public required int[] Colour { get; init; }

    /// <summary>Place of the class; -1 without.</summary>
    public required int Class { get; init; }

    /// <summary>What colours are multiplied by: 65535 for those between 0 and 1.</summary>
    public required double ColourScale { get; init; }

    /// <summary>Reads the first lines of a file.</summary>
    /// <exception cref="InputException">They hold no points, or need a guess.</exception>
    public static TextLayout Of(FileBytes file)
    {
        byte[] start = file.Take(0, Math.Min(file.Length, PeekBytes), "the first lines");
        if (Array.IndexOf(start, (byte)0) >= 0) throw Fault(file, 1, "the text holds zero bytes", "a byte 0", "Save it as plain text (UTF-8)");
        string[] all = Encoding.UTF8.GetString(start).TrimStart('\uFEFF').Split('\n');
        if (file.Length > start.Length) all = all[..^1];   // the last may be cut
        (int Number, string Text)[] lines = [.. all.Index().Select(l => (l.Index + 1, l.Item.Trim())).Where(l => !IsRemark(l.Item2)).Take(PeekLines)];
        if (lines.Length == 0) throw Fault(file, 1, "the file holds no points", "no line with numbers", "Give x y z on each line");

        int first = 0;
        string[]? names = null;
        (char separator, bool comma, double[][] rows) = Numbers(lines);
        if (rows.Length == 0)
        {
            names = Split(lines[0].Text, SeparatorOfNames(lines[0].Text));
            first = 1;
            (separator, comma, rows) = Numbers(lines[1..]);
        }
        else if (rows[0].Length == 1 && rows.Length > 1)
        {
            first = 1;   // a count of points, as some programs write first
            (separator, comma, rows) = Numbers(lines[1..]);
        }

        if (rows.Length == 0) throw Fault(file, lines[0].Number, "the lines are not points", lines[0].Text, "Give x y z or x y z r g b on each line, separated by blanks, tabs, commas or semicolons");
        int columns = rows[0].Length;
        int uneven = Array.FindIndex(rows, r => r.Length != columns);
        if (uneven >= 0) throw Fault(file, lines[first + uneven].Number, "a line has another number of columns than the first", Invariant($"{rows[uneven].Length}, the first {columns}"), "Correct the line");
        (int[] place, int[] colour, int kind) = names is null ? Unnamed(file, rows, columns) : Named(file, names, columns);
        double largest = colour.Length == 0 ? 255 : rows.Max(r => colour.Max(k => r[k]));
        return new TextLayout
        {
            Separator = separator, DecimalComma = comma, LinesBefore = first == 0 ? lines[0].Number - 1 : lines[0].Number, Columns = columns,
            Place = place, Colour = colour, Class = kind, ColourScale = largest <= 1 ? 65535 : 1,
        };
    }

    /// <summary>Whether a line is no data: empty, or a remark.</summary>
    public static bool IsRemark(ReadOnlySpan<char> line) => line.IsEmpty || line[0] == '#' || line.StartsWith("//");

    // The separator under which all lines are numbers. A comma is tried as a separator before it is tried as a decimal mark.
    private static (char Separator, bool Comma, double[][] Rows) Numbers((int Number, string Text)[] lines)
    {
        foreach ((char separator, bool comma) in (ReadOnlySpan<(char, bool)>)[(';', false), (';', true), (',', false), (' ', false), (' ', true)])
        {
            if (separator != ' ' && !(lines.Length > 0 && lines[^1].Text.Contains(separator, StringComparison.Ordinal))) continue;
            var rows = new List<double[]>();
            foreach ((_, string text) in lines)
            {
                string[] cells = Split(text, separator);
                var row = new double[cells.Length];
                bool good = true;
                for (int i = 0; good && i < cells.Length; i++)
                {
                    string cell = comma ? cells[i].Replace(',', '.') : cells[i];
                    good = AsciiNumber.TryParse(Encoding.ASCII.GetBytes(cell), out row[i]);
                }

                if (!good) break;
                rows.Add(row);
            }

            if (rows.Count == lines.Length && rows.Count > 0) return (separator, comma, [.. rows]);
        }

        return (' ', false, []);
    }

    private static string[] Split(string text, char separator) => separator == ' '
        ? text.Split((char[])[' ', '\t'], StringSplitOptions.RemoveEmptyEntries)
        : text.TrimEnd(separator).Split(separator, StringSplitOptions.TrimEntries);

    private static char SeparatorOfNames(string text) => text.Contains(';', StringComparison.Ordinal) ? ';' : text.Contains(',', StringComparison.Ordinal) ? ',' : ' ';

    private static (int[] Place, int[] Colour, int Class) Named(FileBytes file, string[] names, int columns)
    {
        int Find(string[] among) => Array.FindIndex(names, n => among.Contains(n.Trim('"').ToLowerInvariant(), StringComparer.Ordinal));
        if (names.Length != columns) throw Fault(file, 1, "the names and the numbers differ in count", Invariant($"{names.Length} names, {columns} numbers a line"), "Give each column one name");
        int[] place = [Find(X), Find(Y), Find(Z)], colour = [Find(R), Find(G), Find(B)];
        if (place.Contains(-1)) throw Fault(file, 1, "the names do not say which columns are x, y and z", string.Join(" ", names.Take(20)), "Name them x, y, z and the colours r, g, b");
        return (place, colour.Contains(-1) ? [] : colour, Find(C));
    }

    private static (int[] Place, int[] Colour, int Class) Unnamed(FileBytes file, double[][] rows, int columns)
    {
        bool Bytes(int from) => rows.All(r => r[from..(from + 3)].All(v => v is >= 0 and <= 255 && v == Math.Floor(v)));
        bool Shorts(int from) => rows.All(r => r[from..(from + 3)].All(v => v is >= 0 and <= 65535 && v == Math.Floor(v)));
        bool Shares(int from) => rows.All(r => r[from..(from + 3)].All(v => v is >= 0 and <= 1));
        bool Colours(int from) => Bytes(from) || Shorts(from) || Shares(from);
        switch (columns)
        {
            case 3 or 4: return ([0, 1, 2], [], -1);
            case 6 when Colours(3): return ([0, 1, 2], [3, 4, 5], -1);
            case 7 when Bytes(3) != Bytes(4): return ([0, 1, 2], Bytes(3) ? [3, 4, 5] : [4, 5, 6], -1);
            default:
                throw Fault(file, 1, "what the columns mean cannot be told", Invariant($"{columns} numbers a line, no names"), "Put a first line with names: x y z r g b, others as you like");
        }
    }

    private static InputException Fault(FileBytes file, int line, string what, string found, string mend) =>
        new(Invariant($"{file.Name}, line {line}"), what, found.Length > 80 ? found[..80] + "..." : found, mend);
}
