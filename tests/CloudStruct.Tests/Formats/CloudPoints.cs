namespace CloudStruct.Tests.Formats;

/// <summary>All points of a file, column by column.</summary>
internal sealed class CloudPoints
{
    public List<double> X { get; } = [];
    public List<double> Y { get; } = [];
    public List<double> Z { get; } = [];
    public List<ushort> Red { get; } = [];
    public List<ushort> Green { get; } = [];
    public List<ushort> Blue { get; } = [];
    public List<byte> Class { get; } = [];
    public int Withheld { get; set; }
    public int Count => X.Count;
}
