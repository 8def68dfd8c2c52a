using System.Globalization;
using System.Text;
using CloudStruct.Formats.Bytes;
using CloudStruct.Records.Complaints;
using static System.FormattableString;

namespace CloudStruct.Formats.Ply;

/// <summary>Reads the header of a PLY file and checks its counts against the file's size.</summary>
/// <remarks>Lines may end in LF, CR LF or CR, also mixed. Binary data starts after the line end of end_header: where the
/// header's own lines end in a lone CR, one byte is its end, and a following LF is data.</remarks>
internal sealed class PlyHeaderReader
{
    // Real headers have some hundred bytes; the limit keeps a file without end_header from being read whole.
    private const int MostHeaderBytes = 1 << 20;

    // Each is a column of numbers; more is damage.
    private const int MostElements = 100, MostProperties = 1000;

    private readonly FileBytes file;
    private readonly byte[] text;
    private readonly List<PlyElement> elements = [];
    private readonly List<string> comments = [];
    private PlyEncoding? encoding;
    private int at;
    private int line;
    private bool loneReturns;

    private PlyHeaderReader(FileBytes file)
    {
        this.file = file;
        // Most headers fit the first piece; the rest is fetched only when no end is in it.
        byte[] first = file.Take(0, Math.Min(file.Length, 1 << 14), "the header");
        text = first.AsSpan().IndexOf("end_header"u8) >= 0 || file.Length <= first.Length
            ? first : file.Take(0, Math.Min(file.Length, MostHeaderBytes), "the header");
    }

    /// <summary>Reads the header of an open file that starts with "ply".</summary>
    public static PlyHeader Read(FileBytes file) => new PlyHeaderReader(file).Read();

    private PlyHeader Read()
    {
        if (Next() != "ply") throw Fault("the file does not start with a line \"ply\"", "another first line");
        while (true)
        {
            string? words = Next();
            if (words == null)
                throw Fault("the header has no end_header line", Invariant($"{text.Length} bytes read"), "The file is cut short or damaged; copy or export it again");
            if (words == "end_header") break;
            Line(words);
        }
        if (encoding == null) throw Fault("the header has no format line", "none before end_header");
        var header = new PlyHeader
        {
            Name = file.Name, FileBytes = file.Length, Encoding = encoding.Value, Elements = [.. elements],
            Comments = [.. comments], DataAt = at, Lines = line,
        };
        CheckSizes(header);
        return header;
    }

    private void Line(string words)
    {
        string[] w = words.Split((char[]?)null, StringSplitOptions.RemoveEmptyEntries);
        switch (w.Length == 0 ? "" : w[0])
        {
            case "":
                break;
            case "comment" or "obj_info":
                comments.Add(words.Trim());
                break;
            case "format":
                encoding = w.ElementAtOrDefault(1) switch
                {
                    "ascii" => PlyEncoding.Ascii,
                    "binary_little_endian" => PlyEncoding.LittleEndian,
                    "binary_big_endian" => PlyEncoding.BigEndian,
                    _ => throw Fault("this PLY format is not known", words),
                };
                break;
            case "element":
                if (w.Length < 3 || !long.TryParse(w[2], NumberStyles.None, CultureInfo.InvariantCulture, out long count))
                    throw Fault("an element line needs a name and a count", words);
                if (elements.Count == MostElements) throw Fault("the header has too many elements", Invariant($"more than {MostElements}"));
                elements.Add(new PlyElement(w[1], count, []));
                break;
            case "property":
                Property(w, words);
                break;
            default:
                throw Fault("a header line is not understood", words);
        }
    }

    private void Property(string[] w, string words)
    {
        if (elements.Count == 0) throw Fault("a property stands before the first element", words);
        bool list = w.Length >= 2 && w[1] == "list";
        PlyType? type = w.Length >= (list ? 5 : 3) ? PlyTypes.Parse(w[list ? 3 : 1]) : null;
        PlyType? countType = list && w.Length >= 5 ? PlyTypes.Parse(w[2]) : null;
        if (type == null || (list && (countType == null || PlyTypes.IsFloat(countType.Value))))
            throw Fault("a property line is not understood", words);
        PlyElement e = elements[^1];
        if (e.Properties.Length == MostProperties) throw Fault("an element has too many properties", Invariant($"more than {MostProperties}"));
        elements[^1] = e with { Properties = [.. e.Properties, new PlyProperty(w[list ? 4 : 2], type.Value, countType)] };
    }

    // Least size of what is declared: binary by type, ascii a digit and a separator a value.
    private void CheckSizes(PlyHeader header)
    {
        decimal least = 0;
        foreach (PlyElement e in header.Elements)
        {
            if (e.Properties.Length == 0 && e.Count > 0)
                throw new InputException(file.Name, "an element has records but no properties", Invariant($"element {e.Name}, count {e.Count}"),
                    "The header is damaged; export the file again");
            least += (decimal)e.Count * (header.Encoding == PlyEncoding.Ascii ? 2 * e.Properties.Length : e.LeastBytes);
        }
        long room = header.FileBytes - header.DataAt + 1;   // the last separator may be missing
        if (least > room)
            throw new InputException(Invariant($"{file.Name}, byte {header.DataAt}"), "the file is cut short",
                Invariant($"the elements declared need {least} bytes at least, {header.FileBytes - header.DataAt} follow the header"),
                "The copy is incomplete; copy the file again and compare sizes");
    }

    /// <summary>Next header line without its end; null when the text runs out.</summary>
    private string? Next()
    {
        ReadOnlySpan<byte> rest = text.AsSpan(at);
        int end = rest.IndexOfAny((byte)'\n', (byte)'\r');
        if (end < 0) return null;
        string words = Encoding.UTF8.GetString(rest[..end]).TrimEnd();
        int length = 1;
        if (rest[end] == '\r')
        {
            bool pair = end + 1 < rest.Length && rest[end + 1] == '\n';
            if (line == 0) loneReturns = !pair;
            if (pair && !loneReturns) length = 2;
        }
        at += end + length;
        line++;
        return words;
    }

    private InputException Fault(string what, string found, string mend = "Export the cloud again as PLY, or as LAS") =>
        new(Invariant($"{file.Name}, line {Math.Max(line, 1)}"), what, found.Length > 120 ? found[..120] + "..." : found, mend);
}
