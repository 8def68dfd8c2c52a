using System.Globalization;
using System.Text;
using CloudStruct.Formats.Bytes;
using CloudStruct.Records.Complaints;
using static System.FormattableString;

namespace CloudStruct.Formats.Ply;

/// <summary>Values of an ascii PLY file: one record a line, values apart by blanks.</summary>
internal sealed class PlyAsciiCursor : PlyCursor
{
    // The longest double written by any program has about 25 characters, in full decimal rarely twice that.
    private const int MostDigits = 60;

    private PlyElement element = new("", 0, []);
    private long line;

    /// <summary>Half a unit of the last digit of the value read last: how exactly the text states it.</summary>
    public double HalfUnit { get; private set; }

    /// <summary>A cursor at the first line after the header.</summary>
    public PlyAsciiCursor(FileBytes file, PlyHeader header)
        : base(file, header) => line = header.Lines + 1;

    /// <inheritdoc/>
    public override void StartRecord(PlyElement element)
    {
        this.element = element;
        while (true)
        {
            Blanks();
            ReadOnlySpan<byte> s = Peek(2);
            if (s.Length == 0 || s[0] is not ((byte)'\n' or (byte)'\r')) return;
            LineEnd(s);
        }
    }

    /// <inheritdoc/>
    public override void EndRecord()
    {
        Blanks();
        ReadOnlySpan<byte> s = Peek(2);
        if (s.Length == 0) return;
        if (s[0] is not ((byte)'\n' or (byte)'\r'))
        {
            // One writer of meshes puts a list of corner colours where it declares one colour: what is wanted stood before it.
            if (ReferenceEquals(element, Header.Vertices))
                throw Fault(Invariant($"a line holds more values than element {element.Name} declares"), Shown(Token()));
            s = RestOfLine();
            if (s.Length == 0) return;
        }
        LineEnd(s);
    }

    /// <inheritdoc/>
    public override double Value(PlyType type)
    {
        // A coordinate declared as float keeps what the text says beyond a float: many writers print doubles so.
        ReadOnlySpan<byte> token = Token();
        if (!AsciiNumber.TryParse(token, out double v)) throw Fault("a value is not a number", Shown(token));
        HalfUnit = AsciiNumber.HalfUnit(token);
        return v;
    }

    /// <inheritdoc/>
    public override long Whole(PlyType type)
    {
        ReadOnlySpan<byte> token = Token();
        if (long.TryParse(token, NumberStyles.AllowLeadingSign, CultureInfo.InvariantCulture, out long n)) return n;
        // Some writers print list lengths and indices as 3.0.
        if (AsciiNumber.TryParse(token, out double v) && v == Math.Floor(v) && Math.Abs(v) < 1e15) return (long)v;
        throw Fault("a list length or index is not a whole number", Shown(token));
    }

    /// <inheritdoc/>
    public override void Skip(PlyType type, long count)
    {
        for (long i = 0; i < count; i++) Token();
    }

    /// <inheritdoc/>
    public override void CheckList(PlyType type, long count)
    {
        if (count < 0 || count > (Left + 1) / 2)
            throw Fault("a list is longer than the rest of the file", Invariant($"{count} values, {Left} bytes left"));
    }

    private ReadOnlySpan<byte> Token()
    {
        Blanks();
        ReadOnlySpan<byte> s = Peek(MostDigits + 2);
        int end = s.IndexOfAny(" \t\r\n"u8);
        if (end < 0) end = s.Length;
        if (end == 0)
            throw s.Length == 0
                ? Fault(Invariant($"the file ends within element {element.Name}"), Invariant($"{Header.FileBytes} bytes"))
                : Fault(Invariant($"a line holds fewer values than element {element.Name} declares"), "the end of the line");
        if (end > MostDigits) throw Fault("a value is not a number", Shown(s[..MostDigits]) + "...");
        Advance(end);
        return s[..end];
    }

    private ReadOnlySpan<byte> RestOfLine()
    {
        while (true)
        {
            ReadOnlySpan<byte> s = Peek(2);
            int n = s.IndexOfAny((byte)'\n', (byte)'\r');
            if (n == 0 || s.Length == 0) return s;
            Advance(n < 0 ? s.Length : n);
        }
    }

    private void Blanks()
    {
        while (true)
        {
            ReadOnlySpan<byte> s = Peek(1);
            int n = s.IndexOfAnyExcept((byte)' ', (byte)'\t');
            if (n == 0 || s.Length == 0) return;
            Advance(n < 0 ? s.Length : n);
            if (n > 0) return;
        }
    }

    private void LineEnd(ReadOnlySpan<byte> s)
    {
        Advance(s[0] == '\r' && s.Length > 1 && s[1] == '\n' ? 2 : 1);
        line++;
    }

    private static string Shown(ReadOnlySpan<byte> token) =>
        "\"" + string.Concat(Encoding.Latin1.GetString(token).Select(c => char.IsControl(c) ? '?' : c)) + "\"";

    private InputException Fault(string what, string found) => new(Invariant($"{Header.Name}, line {line}"), what, found,
        "The file is cut short or damaged; copy or export it again (numbers with a decimal point, blanks between)");
}
