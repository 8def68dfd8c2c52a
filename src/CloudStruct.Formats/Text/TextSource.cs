using System.Text;
using CloudStruct.Formats.Bytes;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Points;
using static System.FormattableString;

namespace CloudStruct.Formats.Text;

/// <summary>A cloud in plain text, a point a line, streamed.</summary>
internal sealed class TextSource : IPointSource
{
    private const int BufferBytes = 1 << 20, LongestLine = 1 << 16;

    private readonly string path;
    private readonly TextLayout layout;
    private readonly long length;

    /// <summary>Opens a file; its lines are counted, its numbers read later.</summary>
    public TextSource(string path, FileBytes file)
    {
        this.path = path;
        layout = TextLayout.Of(file);
        length = file.Length;
        long points = 0;
        foreach ((int at, ReadOnlyMemory<byte> line) in Lines(file, CancellationToken.None)) if (at > layout.LinesBefore && !IsRemark(line.Span)) points++;
        string separator = layout.Separator switch { ' ' => "blanks", ',' => "commas", _ => "semicolons" };
        Header = new CloudHeader
        {
            Name = file.Name,
            Format = "text, " + separator + (layout.DecimalComma ? ", decimal comma" : ""),
            Bytes = length,
            Points = points,
            HasColour = layout.Colour.Length > 0,
            Facts = [new HeaderFact("columns", Invariant($"{layout.Columns}: x {layout.Place[0] + 1}, y {layout.Place[1] + 1}, z {layout.Place[2] + 1}{(layout.Colour.Length > 0 ? Invariant($", colour {layout.Colour[0] + 1}, {layout.Colour[1] + 1}, {layout.Colour[2] + 1}") : "")}"))],
        };
    }

    /// <inheritdoc/>
    public CloudHeader Header { get; }

    /// <inheritdoc/>
    public IEnumerable<SourceBlock> Read(CancellationToken stop)
    {
        using var file = new FileBytes(path);
        if (file.Length != length)
            throw new InputException(Header.Name, "the file changed while it was in use", Invariant($"{file.Length} bytes, {length} when opened"), "Wait until it is fully written, then run again");
        SourceBlock? block = null;
        double[] row = new double[layout.Columns];
        try
        {
            foreach ((int at, ReadOnlyMemory<byte> line) in Lines(file, stop))
            {
                if (at <= layout.LinesBefore || IsRemark(line.Span)) continue;
                Parse(line.Span, at, row);
                block ??= new SourceBlock(Header.HasColour);
                Put(row, at, block);
                if (block.Count < SourceBlock.Capacity) continue;
                SourceBlock full = block;
                block = null;
                yield return full;
            }

            if (block is not null)
            {
                SourceBlock rest = block;
                block = null;
                yield return rest;
            }
        }
        finally
        {
            block?.Dispose();
        }
    }

    private static bool IsRemark(ReadOnlySpan<byte> line) => line.IsEmpty || line[0] == '#' || line.StartsWith("//"u8);

    private static IEnumerable<(int Number, ReadOnlyMemory<byte> Line)> Lines(FileBytes file, CancellationToken stop)
    {
        byte[] buffer = new byte[BufferBytes + LongestLine];
        long at = 0;
        int kept = 0, number = 0;
        while (true)
        {
            stop.ThrowIfCancellationRequested();
            int read = file.Read(at, buffer.AsSpan(kept, BufferBytes)), end = kept + read, from = at == 0 && buffer.AsSpan(0, end).StartsWith((ReadOnlySpan<byte>)[0xEF, 0xBB, 0xBF]) ? 3 : 0;
            at += read;
            while (true)
            {
                int length = buffer.AsSpan(from, end - from).IndexOf((byte)'\n');
                if (length < 0) break;
                yield return (++number, Trimmed(buffer, from, length));
                from += length + 1;
            }

            kept = end - from;
            if (kept > LongestLine) throw new InputException(Invariant($"{file.Name}, line {number + 1}"), "a line is too long for a point", Invariant($"more than {LongestLine} bytes"), "Give one point a line");
            if (read < BufferBytes)
            {
                if (kept > 0) yield return (++number, Trimmed(buffer, from, kept));
                yield break;
            }

            buffer.AsSpan(from, kept).CopyTo(buffer);
        }
    }

    private static ReadOnlyMemory<byte> Trimmed(byte[] buffer, int from, int length)
    {
        ReadOnlySpan<byte> blanks = " \t\r"u8;
        while (length > 0 && blanks.Contains(buffer[from + length - 1])) length--;
        while (length > 0 && blanks.Contains(buffer[from]))
        {
            from++;
            length--;
        }

        return buffer.AsMemory(from, length);
    }

    private void Parse(ReadOnlySpan<byte> line, int number, double[] row)
    {
        Span<byte> cell = stackalloc byte[64];
        int column = 0, at = 0;
        ReadOnlySpan<byte> rest = layout.Separator == ' ' ? line : line.TrimEnd((byte)layout.Separator);
        while (at <= rest.Length && rest.Length > 0)
        {
            int length = layout.Separator == ' ' ? rest[at..].IndexOfAny((byte)' ', (byte)'\t') : rest[at..].IndexOf((byte)layout.Separator);
            if (length < 0) length = rest.Length - at;
            ReadOnlySpan<byte> text = rest.Slice(at, length).Trim(" \t"u8);
            at += length + 1;
            if (text.IsEmpty && layout.Separator == ' ') continue;
            bool good = text.Length <= cell.Length && column < row.Length;
            if (good)
            {
                text.CopyTo(cell);
                Span<byte> own = cell[..text.Length];
                if (layout.DecimalComma) own.Replace((byte)',', (byte)'.');
                good = AsciiNumber.TryParse(own, out row[column]);
            }

            if (!good) throw Fault(line, number);
            column++;
        }

        if (column != row.Length) throw Fault(line, number);
    }

    private InputException Fault(ReadOnlySpan<byte> line, int number) => new(
        Invariant($"{Header.Name}, line {number}"), Invariant($"a line is not a point of {layout.Columns} numbers like those before it"),
        Encoding.UTF8.GetString(line[..Math.Min(60, line.Length)]), "Correct or remove the line");

    private void Put(double[] row, int number, SourceBlock block)
    {
        int k = block.Count;
        (block.X[k], block.Y[k], block.Z[k], block.Class[k]) = (row[layout.Place[0]], row[layout.Place[1]], row[layout.Place[2]], 0);
        if (layout.Class >= 0 && row[layout.Class] is >= 0 and <= 255) block.Class[k] = (byte)row[layout.Class];
        if (block.HasColour)
        {
            block.Red[k] = Level(row, 0, number);
            block.Green[k] = Level(row, 1, number);
            block.Blue[k] = Level(row, 2, number);
        }

        block.Count = k + 1;
    }

    private ushort Level(double[] row, int channel, int number)
    {
        double v = row[layout.Colour[channel]] * layout.ColourScale;
        return v is >= 0 and <= 65535 ? (ushort)Math.Round(v) : throw new InputException(
            Invariant($"{Header.Name}, line {number}"), "a colour is out of range", Invariant($"{row[layout.Colour[channel]]}"), "Colours go from 0 to 255 or from 0 to 65535");
    }
}
