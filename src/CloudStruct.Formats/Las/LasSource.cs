using System.Buffers.Binary;
using CloudStruct.Formats.Bytes;
using CloudStruct.Formats.Laz;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Points;
using static System.FormattableString;

namespace CloudStruct.Formats.Las;

/// <summary>Points of a LAS or LAZ file in file order, streamed: plain records from large reads, compressed ones chunk by chunk.</summary>
/// <remarks>Points flagged as withheld are deleted in the words of the standard: they are left out and counted in
/// <see cref="SourceBlock.Withheld"/>.</remarks>
internal sealed class LasSource : IPointSource
{
    // About one block of points in the shorter formats, so that a block takes one or two reads.
    private const int BufferBytes = 1 << 21;

    private const int TileRecords = 1024;

    private readonly string path;
    private readonly LasHeader las;

    /// <summary>A source over a file whose header has been read.</summary>
    public LasSource(string path, LasHeader las, CloudHeader header)
    {
        this.path = path;
        this.las = las;
        Header = header;
    }

    /// <inheritdoc/>
    public CloudHeader Header { get; }

    /// <inheritdoc/>
    public IEnumerable<SourceBlock> Read(CancellationToken stop)
    {
        if (las.IsTruncated)
            throw new InputException(Invariant($"{las.Name}, byte {las.PointsAt}"), "the file is cut short",
                Invariant($"{las.Declared} points of {las.RecordBytes} bytes declared, {las.Present} are there in {las.FileBytes} bytes"),
                "The copy is incomplete; copy the file again and compare sizes");
        return las.Laz is null ? Blocks(stop) : Decompressed(stop);
    }

    private IEnumerable<SourceBlock> Blocks(CancellationToken stop)
    {
        using FileBytes file = Reopen();
        long left = las.Present, at = las.PointsAt;
        int perRead = (int)Math.Min(left, Math.Max(1, BufferBytes / las.RecordBytes));
        byte[] buffer = new byte[perRead * las.RecordBytes];
        while (left > 0)
        {
            var block = new SourceBlock(LasRecord.ColourOffset(las.PointFormat) >= 0);
            try
            {
                while (left > 0 && SourceBlock.Capacity - block.Count - block.Withheld >= 1)
                {
                    stop.ThrowIfCancellationRequested();
                    int n = (int)Math.Min(Math.Min(left, perRead), SourceBlock.Capacity - block.Count - block.Withheld);
                    Span<byte> bytes = buffer.AsSpan(0, n * las.RecordBytes);
                    if (file.Read(at, bytes) < bytes.Length)
                        throw new InputException(Invariant($"{las.Name}, byte {at}"), "the file became shorter while it was read",
                            Invariant($"{las.FileBytes} bytes when opened"), "Wait until it is fully written, then run again");
                    UnpackByTiles(bytes, n, block);
                    at += bytes.Length;
                    left -= n;
                }
            }
            catch
            {
                block.Dispose();
                throw;
            }
            yield return block;
        }
    }

    private IEnumerable<SourceBlock> Decompressed(CancellationToken stop)
    {
        using FileBytes file = Reopen();
        var block = new SourceBlock(LasRecord.ColourOffset(las.PointFormat) >= 0);
        try
        {
            foreach ((byte[] records, int count) in new LazPoints(file, las.Laz!, las.PointsAt, las.Declared).Read(stop))
            {
                for (int done = 0; done < count;)
                {
                    int n = Math.Min(count - done, SourceBlock.Capacity - block.Count - block.Withheld);
                    UnpackByTiles(records.AsSpan(done * las.RecordBytes, n * las.RecordBytes), n, block);
                    done += n;
                    if (block.Count + block.Withheld < SourceBlock.Capacity) continue;
                    SourceBlock full = block;
                    block = new SourceBlock(full.HasColour);
                    yield return full;
                }
            }

            if (block.Count + block.Withheld > 0)
            {
                SourceBlock rest = block;
                block = new SourceBlock(rest.HasColour);
                yield return rest;
            }
        }
        finally
        {
            block.Dispose();
        }
    }

    private FileBytes Reopen()
    {
        var file = new FileBytes(path);
        if (file.Length == las.FileBytes) return file;
        using (file)
        {
            throw new InputException(las.Name, "the file changed while it was in use", Invariant($"{file.Length} bytes, {las.FileBytes} when opened"),
                "Wait until it is fully written, then run again");
        }
    }

    // Records of a tile stay in the nearest cache while column after column is taken out of them.
    private void UnpackByTiles(ReadOnlySpan<byte> records, int n, SourceBlock block)
    {
        for (int done = 0; done < n; done += TileRecords)
        {
            int some = Math.Min(TileRecords, n - done);
            Unpack(records.Slice(done * las.RecordBytes, some * las.RecordBytes), some, block);
        }
    }

    // Column by column: each loop has one type, one offset and one destination.
    private void Unpack(ReadOnlySpan<byte> records, int n, SourceBlock block)
    {
        int start = block.Count;
        Coordinates(records, 0, las.Scale.X, las.Offset.X, block.X.AsSpan(start, n));
        Coordinates(records, 4, las.Scale.Y, las.Offset.Y, block.Y.AsSpan(start, n));
        Coordinates(records, 8, las.Scale.Z, las.Offset.Z, block.Z.AsSpan(start, n));
        int colourAt = LasRecord.ColourOffset(las.PointFormat);
        if (colourAt >= 0)
        {
            Shorts(records, colourAt, block.Red.AsSpan(start, n));
            Shorts(records, colourAt + 2, block.Green.AsSpan(start, n));
            Shorts(records, colourAt + 4, block.Blue.AsSpan(start, n));
        }
        bool anyWithheld = Classes(records, block.Class.AsSpan(start, n));
        block.Count += n;
        if (anyWithheld) DropWithheld(records, block, start);
    }

    private void Coordinates(ReadOnlySpan<byte> records, int at, double scale, double offset, Span<double> to)
    {
        unchecked
        {
            int step = las.RecordBytes;
            for (int i = 0; i < to.Length; i++, at += step)
                to[i] = (BinaryPrimitives.ReadInt32LittleEndian(records[at..]) * scale) + offset;
        }
    }

    private void Shorts(ReadOnlySpan<byte> records, int at, Span<ushort> to)
    {
        unchecked
        {
            int step = las.RecordBytes;
            for (int i = 0; i < to.Length; i++, at += step) to[i] = BinaryPrimitives.ReadUInt16LittleEndian(records[at..]);
        }
    }

    private bool Classes(ReadOnlySpan<byte> records, Span<byte> to)
    {
        int step = las.RecordBytes, flags = 0;
        if (LasRecord.HasWideClass(las.PointFormat))
        {
            for (int i = 0, at = 15; i < to.Length; i++, at += step)
            {
                flags |= records[at];
                to[i] = records[at + 1];
            }
            return (flags & LasRecord.WithheldWide) != 0;
        }
        for (int i = 0, at = 15; i < to.Length; i++, at += step)
        {
            flags |= records[at];
            to[i] = (byte)(records[at] & 0x1F);
        }
        return (flags & LasRecord.WithheldNarrow) != 0;
    }

    private void DropWithheld(ReadOnlySpan<byte> records, SourceBlock block, int start)
    {
        int bit = LasRecord.HasWideClass(las.PointFormat) ? LasRecord.WithheldWide : LasRecord.WithheldNarrow;
        int kept = start;
        for (int i = start, at = 15; i < block.Count; i++, at += las.RecordBytes)
        {
            if ((records[at] & bit) != 0) continue;
            block.X[kept] = block.X[i];
            block.Y[kept] = block.Y[i];
            block.Z[kept] = block.Z[i];
            block.Class[kept] = block.Class[i];
            if (block.HasColour)
            {
                block.Red[kept] = block.Red[i];
                block.Green[kept] = block.Green[i];
                block.Blue[kept] = block.Blue[i];
            }
            kept++;
        }
        block.Withheld += block.Count - kept;
        block.Count = kept;
    }
}
