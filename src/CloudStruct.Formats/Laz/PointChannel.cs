using System.Buffers.Binary;

namespace CloudStruct.Formats.Laz;

/// <summary>All that the point item of formats 6 to 10 remembers of one scanner channel.</summary>
internal sealed class PointChannel
{
    /// <summary>A channel from the record that it starts with.</summary>
    public PointChannel(ReadOnlySpan<byte> record)
    {
        record[..Point14.Bytes].CopyTo(Last);
        Array.Fill(LastZ, BinaryPrimitives.ReadInt32LittleEndian(record[8..]));
        Array.Fill(LastIntensity, BinaryPrimitives.ReadUInt16LittleEndian(record[12..]));
        Times.Start(BinaryPrimitives.ReadInt64LittleEndian(record[22..]));
    }

    public byte[] Last { get; } = new byte[Point14.Bytes];

    public bool TimeChanged { get; set; }

    public SymbolModel?[] Changed { get; } = new SymbolModel?[8];

    public SymbolModel Channel { get; } = new(3);

    public SymbolModel?[] Returns { get; } = new SymbolModel?[16];

    public SymbolModel?[] ReturnNumber { get; } = new SymbolModel?[16];

    public SymbolModel ReturnSameTime { get; } = new(13);

    public SymbolModel?[] Classification { get; } = new SymbolModel?[64];

    public SymbolModel?[] Flags { get; } = new SymbolModel?[64];

    public SymbolModel?[] User { get; } = new SymbolModel?[64];

    public IntegerCoder X { get; } = new(32, 2);

    public IntegerCoder Y { get; } = new(32, 22);

    public IntegerCoder Z { get; } = new(32, 20);

    public IntegerCoder Intensity { get; } = new(16, 4);

    public IntegerCoder Angle { get; } = new(16, 2);

    public IntegerCoder Source { get; } = new(16, 1);

    public RunningMedian[] MedianX { get; } = new RunningMedian[12];

    public RunningMedian[] MedianY { get; } = new RunningMedian[12];

    public int[] LastZ { get; } = new int[8];

    public ushort[] LastIntensity { get; } = new ushort[8];

    public TimeSequences Times { get; } = new(layered: true);
}
