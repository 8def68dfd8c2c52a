using System.Buffers.Binary;
using CloudStruct.Formats.Bytes;
using CloudStruct.Records.Complaints;
using static System.FormattableString;

namespace CloudStruct.Formats.Ply;

/// <summary>Values of a binary PLY file.</summary>
internal sealed class PlyBinaryCursor : PlyCursor
{
    private readonly bool bigEndian;
    private string element = "";

    /// <summary>A cursor at the first byte after the header.</summary>
    public PlyBinaryCursor(FileBytes file, PlyHeader header)
        : base(file, header) => bigEndian = header.Encoding == PlyEncoding.BigEndian;

    /// <inheritdoc/>
    public override void StartRecord(PlyElement element) => this.element = element.Name;

    /// <inheritdoc/>
    public override void EndRecord()
    {
    }

    /// <inheritdoc/>
    public override double Value(PlyType type)
    {
        int bytes = PlyTypes.Bytes(type);
        double v = PlyValue.Read(Some(bytes), type, bigEndian);
        Advance(bytes);
        return v;
    }

    /// <inheritdoc/>
    public override long Whole(PlyType type) => (long)Value(type);

    /// <inheritdoc/>
    public override void Skip(PlyType type, long count)
    {
        CheckList(type, count);
        Jump(count * PlyTypes.Bytes(type));
    }

    /// <inheritdoc/>
    public override void CheckList(PlyType type, long count)
    {
        if (count < 0 || count > Left / PlyTypes.Bytes(type))
            throw new InputException(Invariant($"{Header.Name}, byte {At}"), Invariant($"element {element} reaches past the end of the file"),
                Invariant($"{count} values of {PlyTypes.Bytes(type)} bytes wanted, {Left} bytes left"),
                "The file is cut short or damaged; copy or export it again");
    }

    /// <inheritdoc/>
    public override void SkipElement(PlyElement element, CancellationToken stop)
    {
        if (!element.IsFixed)
        {
            base.SkipElement(element, stop);
            return;
        }
        this.element = element.Name;
        if (element.Count > Left / Math.Max(1, element.LeastBytes)) CheckList(PlyType.UInt8, long.MaxValue);
        Jump(element.Count * element.LeastBytes);
    }

    private ReadOnlySpan<byte> Some(int bytes)
    {
        ReadOnlySpan<byte> s = Peek(bytes);
        if (s.Length < bytes) CheckList(PlyType.UInt8, bytes);
        return s;
    }
}
